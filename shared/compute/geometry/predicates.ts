import { orient2d } from 'robust-predicates';

/** A plain pair of coordinates in any one frame; branded points are pairs too. */
export type Pair = readonly [x: number, y: number];

/**
 * On which side of the line a→b the point c lies: positive, negative or exactly 0, without rounding error. All
 * three in one frame. The sign is fixed here so that nobody needs to remember the library's: +1 means that a, b, c
 * turn counter-clockwise in axes with y up (clockwise as seen on a sheet, where y runs down).
 * Source: Shewchuk (1997), adaptive precision predicates, as in the robust-predicates package, whose sign it turns.
 */
export function orientation(ax: number, ay: number, bx: number, by: number, cx: number, cy: number): number {
  return -Math.sign(orient2d(ax, ay, bx, by, cx, cy));
}

/** True when the closed segments a–b and c–d share at least one point, touching included. Exact. */
export function segmentsMeet(
  ax: number,
  ay: number,
  bx: number,
  by: number,
  cx: number,
  cy: number,
  dx: number,
  dy: number,
): boolean {
  const c = orientation(ax, ay, bx, by, cx, cy);
  const d = orientation(ax, ay, bx, by, dx, dy);
  if (c * d > 0) return false;
  const a = orientation(cx, cy, dx, dy, ax, ay);
  const b = orientation(cx, cy, dx, dy, bx, by);
  if (a * b > 0) return false;
  if (c !== 0 || d !== 0 || a !== 0 || b !== 0) return true;
  return overlaps(ax, bx, cx, dx) && overlaps(ay, by, cy, dy);
}

function overlaps(a: number, b: number, c: number, d: number): boolean {
  return Math.max(Math.min(a, b), Math.min(c, d)) <= Math.min(Math.max(a, b), Math.max(c, d));
}
