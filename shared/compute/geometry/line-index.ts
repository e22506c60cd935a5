import Flatbush from 'flatbush';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** One straight piece of an indexed line: `line` counts the lines, `segment` its pieces, both from 0. */
export type IndexedSegment = {
  readonly line: number;
  readonly segment: number;
  readonly a: Pair;
  readonly b: Pair;
};

/** Finds the pieces of many lines near a place without going through them all. */
export type LineIndex = {
  /** The pieces whose upright boxes come within `radius` of `at`, in the order of the lines; same frame and unit. */
  near(at: Pair, radius: number): IndexedSegment[];
  /** The pieces whose upright boxes meet an upright box, in no order. */
  within(minX: number, minY: number, maxX: number, maxY: number): IndexedSegment[];
};

/**
 * An index of lines given by their points, any one frame. A line of one point counts as a piece without length, so that
 * its only point can be found; one without points is passed over. A static R-tree packed along a Hilbert curve: Kamel
 * and Faloutsos (1993).
 */
export function indexLines(lines: ReadonlyArray<readonly Pair[]>): LineIndex {
  const segments: IndexedSegment[] = [];
  lines.forEach((points, line) => {
    const last = Math.max(0, points.length - 2);
    for (let segment = 0; points.length > 0 && segment <= last; segment += 1) {
      const a = points[segment]!;
      segments.push({ line, segment, a, b: points[segment + 1] ?? a });
    }
  });
  // The package refuses an empty tree.
  if (segments.length === 0) return { near: () => [], within: () => [] };
  const tree = new Flatbush(segments.length);
  for (const { a, b } of segments) {
    tree.add(Math.min(a[0], b[0]), Math.min(a[1], b[1]), Math.max(a[0], b[0]), Math.max(a[1], b[1]));
  }
  tree.finish();
  return {
    near([x, y], radius) {
      const found = tree.search(x - radius, y - radius, x + radius, y + radius);
      return found.sort((i, k) => i - k).map((i) => segments[i]!);
    },
    within: (minX, minY, maxX, maxY) => tree.search(minX, minY, maxX, maxY).map((i) => segments[i]!),
  };
}
