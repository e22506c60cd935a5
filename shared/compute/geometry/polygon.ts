import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { type Box, boxesMeet } from '#shared/compute/geometry/polyline.ts';
import { orientation, type Pair } from '#shared/compute/geometry/predicates.ts';

/** A closed ring. `xy`: vertices, flat, length 2·n, x0 y0 x1 y1 …, the first not repeated, n ≥ 3. */
export type Ring = { readonly xy: Float64Array; readonly box: Box };

/** A ring through points, consecutive repeats and the closing repeat left out; null with fewer than three left. */
export function ringOf(points: readonly Pair[]): Ring | null {
  const kept: number[] = [];
  for (const [x, y] of points) {
    const n = kept.length;
    if (n === 0 || kept[n - 2] !== x || kept[n - 1] !== y) kept.push(x, y);
  }
  while (kept.length > 2 && kept[0] === kept[kept.length - 2] && kept[1] === kept[kept.length - 1]) {
    kept.length -= 2;
  }
  return kept.length < 6 ? null : { xy: Float64Array.from(kept), box: boxOf(kept) };
}

function boxOf(xy: readonly number[]): Box {
  let minX = Number.POSITIVE_INFINITY;
  let minY = Number.POSITIVE_INFINITY;
  let maxX = Number.NEGATIVE_INFINITY;
  let maxY = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < xy.length; i += 2) {
    minX = Math.min(minX, xy[i]!);
    maxX = Math.max(maxX, xy[i]!);
    minY = Math.min(minY, xy[i + 1]!);
    maxY = Math.max(maxY, xy[i + 1]!);
  }
  return { minX, minY, maxX, maxY };
}

/**
 * Signed area of a ring in squared units of its frame; positive when counter-clockwise in axes with y up (so
 * clockwise on a sheet, where y runs down). 0 for collinear points. Shoelace about the first vertex, to avoid
 * cancellation far from the origin.
 */
export function signedArea(ring: Ring): number {
  const { xy } = ring;
  const x0 = xy[0]!;
  const y0 = xy[1]!;
  let twice = 0;
  for (let i = 2; i + 3 < xy.length; i += 2) {
    twice += (xy[i]! - x0) * (xy[i + 3]! - y0) - (xy[i + 2]! - x0) * (xy[i + 1]! - y0);
  }
  return twice / 2;
}

/**
 * True when a point lies in a ring or exactly on it; same frame. Even-odd rule with exact side tests, so that a
 * point on a shared edge is never missed by both neighbours.
 */
export function ringContains(ring: Ring, x: number, y: number): boolean {
  if (!boxesMeet(ring.box, { minX: x, maxX: x, minY: y, maxY: y })) return false;
  const { xy } = ring;
  const n = xy.length / 2;
  let inside = false;
  for (let i = 0, j = n - 1; i < n; j = i, i += 1) {
    const ax = xy[2 * j]!;
    const ay = xy[2 * j + 1]!;
    const bx = xy[2 * i]!;
    const by = xy[2 * i + 1]!;
    if (ay > y !== by > y) {
      const side = orientation(ax, ay, bx, by, x, y);
      if (side === 0) return true;
      if (side > 0 === by > ay) inside = !inside;
    } else if (ay === y && by === y && x >= Math.min(ax, bx) && x <= Math.max(ax, bx)) {
      return true;
    } else if (bx === x && by === y) {
      return true;
    }
  }
  return inside;
}

/** Distance from a point to the outline of a ring, same frame; 0 on it. */
export function distanceToRing(ring: Ring, x: number, y: number): number {
  const { xy } = ring;
  const n = xy.length / 2;
  let best = Number.POSITIVE_INFINITY;
  for (let i = 0, j = n - 1; i < n; j = i, i += 1) {
    const ax = xy[2 * j]!;
    const ay = xy[2 * j + 1]!;
    const dx = xy[2 * i]! - ax;
    const dy = xy[2 * i + 1]! - ay;
    const square = dx * dx + dy * dy;
    const t = square > 0 ? Math.min(1, Math.max(0, ((x - ax) * dx + (y - ay) * dy) / square)) : 0;
    best = Math.min(best, lengthOfVector(ax + t * dx - x, ay + t * dy - y));
  }
  return best;
}
