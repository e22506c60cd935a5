import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** A line that can be picked: its id and its points in one frame, usually base-raster pixels. */
export type PickableLine = { readonly id: string; readonly points: readonly Pair[] };

export type LineHit = {
  readonly id: string;
  readonly at: Pair;
  readonly segment: number;
  readonly distance: number;
};
export type VertexHit = {
  readonly id: string;
  readonly index: number;
  readonly at: Pair;
  readonly distance: number;
};

/**
 * The nearest place on any of the lines within `radius` of `at`, all in one frame and unit; null when none is that
 * near. `segment` counts the line's own segments from 0. Lines of fewer than two distinct points are passed over.
 */
export function nearestOnLines(lines: readonly PickableLine[], at: Pair, radius: number): LineHit | null {
  let best: LineHit | null = null;
  for (const line of lines) {
    const place = segmentAt(line.points, at, best?.distance ?? radius);
    if (place !== null && (best === null || place.distance < best.distance)) best = { id: line.id, ...place };
  }
  return best;
}

/**
 * The nearest vertex of any of the lines within `radius` of `at`, one frame and unit; null when none is that near.
 * Of several at the same distance the first.
 */
export function nearestVertex(lines: readonly PickableLine[], at: Pair, radius: number): VertexHit | null {
  let best: VertexHit | null = null;
  for (const line of lines) {
    line.points.forEach((point, index) => {
      const distance = Math.hypot(point[0] - at[0], point[1] - at[1]);
      if (distance <= radius && (best === null || distance < best.distance)) {
        best = { id: line.id, index, at: point, distance };
      }
    });
  }
  return best;
}

/**
 * The segment of a line nearest to `at` within `radius`, where a vertex would be inserted after `segment`; null when
 * none is that near. One frame and unit; segments count from 0; segments without length are passed over.
 */
export function segmentAt(points: readonly Pair[], at: Pair, radius: number): Omit<LineHit, 'id'> | null {
  let best: Omit<LineHit, 'id'> | null = null;
  for (let i = 0; i + 1 < points.length; i += 1) {
    const [ax, ay] = points[i]!;
    const dx = points[i + 1]![0] - ax;
    const dy = points[i + 1]![1] - ay;
    const square = dx * dx + dy * dy;
    if (!(square > 0)) continue;
    const t = Math.min(1, Math.max(0, ((at[0] - ax) * dx + (at[1] - ay) * dy) / square));
    const distance = Math.hypot(ax + t * dx - at[0], ay + t * dy - at[1]);
    if (distance > (best?.distance ?? radius)) continue;
    if (best === null || distance < best.distance)
      best = { at: [ax + t * dx, ay + t * dy], segment: i, distance };
  }
  return best;
}
