import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { distanceToSegment, thinned } from '#shared/compute/geometry/thin.ts';

/** A stretch is dense where its segments are no longer than this, unless it is asked otherwise, sheet pixels. */
export const DENSE = 24;
/** Bends of a dense stretch between which it is reshaped are those needed to stay this near, as a part of that length. */
const BEND = 1 / 8;
/** A vertex at which the line turns by more than this is a corner, and stays one. */
const CORNER = (35 * Math.PI) / 180;

/**
 * A line with one vertex moved and those about it following: the shift falls off smoothly along the line, to nothing at
 * the next fixed vertex on either side. `isFixed`: tells the vertices between which the line is reshaped; the ends
 * always are. Where the neighbours are fixed, only the vertex itself moves. Same frame and unit throughout.
 */
export function reshaped(
  points: readonly Pair[],
  index: number,
  to: Pair,
  isFixed: (index: number) => boolean,
): Pair[] {
  const from = points[index];
  if (from === undefined) return [...points];
  const shift: Pair = [to[0] - from[0], to[1] - from[1]];
  const moved = [...points];
  moved[index] = to;
  for (const step of [-1, 1]) {
    const along = distancesTo(points, index, step, isFixed);
    const reach = along.at(-1) ?? 0;
    along.slice(0, -1).forEach((distance, k) => {
      const at = index + step * (k + 1);
      const part = fallOff(distance / reach);
      moved[at] = [points[at]![0] + part * shift[0], points[at]![1] + part * shift[1]];
    });
  }
  return moved;
}

/** Distances along the line from a vertex to those after it in one direction, up to and with the next fixed one. */
function distancesTo(
  points: readonly Pair[],
  index: number,
  step: number,
  isFixed: (index: number) => boolean,
): number[] {
  const along: number[] = [];
  let walked = 0;
  for (let i = index + step; i >= 0 && i < points.length; i += step) {
    const [a, b] = [points[i - step]!, points[i]!];
    walked += Math.hypot(b[0] - a[0], b[1] - a[1]);
    along.push(walked);
    if (i === 0 || i === points.length - 1 || isFixed(i)) break;
  }
  return along;
}

/** 1 at the vertex, 0 at the next fixed one, level at both. */
function fallOff(t: number): number {
  return (1 + Math.cos(Math.PI * Math.min(1, Math.max(0, t)))) / 2;
}

/**
 * The vertices between which a line is reshaped when it is not known where it was clicked, by index: the ends, the
 * corners, all vertices of stretches that are not dense, and of dense ones the bends.
 */
export function bendsOf(points: readonly Pair[], dense = DENSE): ReadonlySet<number> {
  const fixed = new Set<number>();
  let start = 0;
  for (let i = 0; i < points.length; i += 1) {
    if (!isFirm(points, i, dense)) continue;
    fixed.add(i);
    addBends(points, [start, i], BEND * dense, fixed);
    start = i;
  }
  return fixed;
}

/** True for a vertex that holds a line whatever lies about it: an end, a corner, one at the end of a long segment. */
export function isFirm(points: readonly Pair[], i: number, dense = DENSE): boolean {
  const [a, b, c] = [points[i - 1], points[i]!, points[i + 1]];
  if (a === undefined || c === undefined) return true;
  const [before, after] = [Math.hypot(b[0] - a[0], b[1] - a[1]), Math.hypot(c[0] - b[0], c[1] - b[1])];
  if (before > dense || after > dense || distanceToSegment(b, a, c) > BEND * dense) return true;
  const turn = Math.atan2(
    (b[0] - a[0]) * (c[1] - b[1]) - (b[1] - a[1]) * (c[0] - b[0]),
    (b[0] - a[0]) * (c[0] - b[0]) + (b[1] - a[1]) * (c[1] - b[1]),
  );
  return Math.abs(turn) > CORNER;
}

function addBends(
  points: readonly Pair[],
  [from, to]: readonly [number, number],
  tolerance: number,
  fixed: Set<number>,
): void {
  if (to - from < 2) return;
  const stretch = points.slice(from, to + 1);
  const kept = new Set(thinned(stretch, tolerance));
  stretch.forEach((point, k) => {
    if (kept.has(point)) fixed.add(from + k);
  });
}
