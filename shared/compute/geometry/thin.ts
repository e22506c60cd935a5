import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * The points of a polyline that are needed to stay within `tolerance` of it, ends kept; same frame and unit.
 * Source: Ramer (1972), Douglas and Peucker (1973). Fewer than three points are returned as they are.
 */
export function thinned(points: readonly Pair[], tolerance: number): Pair[] {
  if (points.length < 3) return [...points];
  const kept = new Set([0, points.length - 1]);
  const open: Array<readonly [number, number]> = [[0, points.length - 1]];
  for (let span = open.pop(); span !== undefined; span = open.pop()) {
    const [from, to] = span;
    let farthest = tolerance;
    let at = -1;
    for (let i = from + 1; i < to; i += 1) {
      const distance = distanceToSegment(points[i]!, points[from]!, points[to]!);
      if (distance > farthest) {
        farthest = distance;
        at = i;
      }
    }
    if (at < 0) continue;
    kept.add(at);
    open.push([from, at], [at, to]);
  }
  return points.filter((_, i) => kept.has(i));
}

/** Distance of a point from a segment, one frame; from the end when the segment has no length. */
export function distanceToSegment(point: Pair, a: Pair, b: Pair): number {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const square = dx * dx + dy * dy;
  const t =
    square > 0 ? Math.min(1, Math.max(0, ((point[0] - a[0]) * dx + (point[1] - a[1]) * dy) / square)) : 0;
  return lengthOfVector(a[0] + t * dx - point[0], a[1] + t * dy - point[1]);
}
