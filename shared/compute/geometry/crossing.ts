import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { type Box, boxesMeet, type Polyline, RUN } from '#shared/compute/geometry/polyline.ts';
import { type Pair, segmentsMeet } from '#shared/compute/geometry/predicates.ts';

/** Where two polylines meet: the distance along each, and the place. */
export type Crossing = { readonly s: number; readonly t: number; readonly at: Pair };

/**
 * All places where two polylines cross or touch, in order along the first. Same frame. Whether two segments meet is
 * decided exactly; the place is rounded. A place shared by neighbouring segments is given once. Segments that run
 * along one another give one place, the middle of the overlap being close enough for every use made of it.
 */
export function crossingsOf(first: Polyline, second: Polyline): Crossing[] {
  const found = meetingsOf(first, second, Number.POSITIVE_INFINITY);
  found.sort((a, b) => a.s - b.s);
  return found.filter((crossing, i) => i === 0 || !sameCrossing(crossing, found[i - 1]!));
}

/** How often segments of two polylines meet, a place at a vertex counted for each segment; counts no further than `most`. */
export function countMeetings(first: Polyline, second: Polyline, most: number): number {
  return Math.min(most, meetingsOf(first, second, most).length);
}

function meetingsOf(first: Polyline, second: Polyline, most: number): Crossing[] {
  const found: Crossing[] = [];
  if (!boxesMeet(first.box, second.box)) return found;
  for (let p = 0; 4 * p < first.runs.length; p += 1) {
    if (!runMeetsBox(first, p, second.box)) continue;
    for (let q = 0; 4 * q < second.runs.length; q += 1) {
      if (runsMeet(first.runs, p, second.runs, q)) crossRuns(first, p, second, q, found);
      if (found.length >= most) return found;
    }
  }
  return found;
}

function crossRuns(first: Polyline, p: number, second: Polyline, q: number, found: Crossing[]): void {
  const lastI = Math.min(first.cum.length - 1, (p + 1) * RUN);
  const lastJ = Math.min(second.cum.length - 1, (q + 1) * RUN);
  for (let i = p * RUN; i < lastI; i += 1) {
    const ax = first.xy[2 * i]!;
    const ay = first.xy[2 * i + 1]!;
    const bx = first.xy[2 * i + 2]!;
    const by = first.xy[2 * i + 3]!;
    for (let j = q * RUN; j < lastJ; j += 1) {
      const cx = second.xy[2 * j]!;
      const cy = second.xy[2 * j + 1]!;
      const dx = second.xy[2 * j + 2]!;
      const dy = second.xy[2 * j + 3]!;
      if (Math.max(cx, dx) < Math.min(ax, bx) || Math.min(cx, dx) > Math.max(ax, bx)) continue;
      if (Math.max(cy, dy) < Math.min(ay, by) || Math.min(cy, dy) > Math.max(ay, by)) continue;
      if (!segmentsMeet(ax, ay, bx, by, cx, cy, dx, dy)) continue;
      const [t, u] = parametersOf(ax, ay, bx, by, cx, cy, dx, dy);
      found.push({
        s: first.cum[i]! + t * (first.cum[i + 1]! - first.cum[i]!),
        t: second.cum[j]! + u * (second.cum[j + 1]! - second.cum[j]!),
        at: [ax + t * (bx - ax), ay + t * (by - ay)],
      });
    }
  }
}

function runMeetsBox({ runs }: Polyline, run: number, box: Box): boolean {
  return (
    runs[4 * run]! <= box.maxX &&
    runs[4 * run + 2]! >= box.minX &&
    runs[4 * run + 1]! <= box.maxY &&
    runs[4 * run + 3]! >= box.minY
  );
}

function runsMeet(a: Float64Array, p: number, b: Float64Array, q: number): boolean {
  return (
    a[4 * p]! <= b[4 * q + 2]! &&
    a[4 * p + 2]! >= b[4 * q]! &&
    a[4 * p + 1]! <= b[4 * q + 3]! &&
    a[4 * p + 3]! >= b[4 * q + 1]!
  );
}

function sameCrossing(a: Crossing, b: Crossing): boolean {
  const scale = 1e-9 * (1 + Math.abs(a.s) + Math.abs(a.t));
  return Math.abs(a.s - b.s) <= scale && Math.abs(a.t - b.t) <= scale;
}

/** Parts of the two segments, each 0 to 1, at which they meet; for parallel ones the middle of what they share. */
function parametersOf(
  ax: number,
  ay: number,
  bx: number,
  by: number,
  cx: number,
  cy: number,
  dx: number,
  dy: number,
): [number, number] {
  const rx = bx - ax;
  const ry = by - ay;
  const qx = dx - cx;
  const qy = dy - cy;
  const cross = rx * qy - ry * qx;
  // Segments of one straight line, parallel but for rounding, have no crossing worth the name.
  if (Math.abs(cross) > 1e-9 * lengthOfVector(rx, ry) * lengthOfVector(qx, qy)) {
    const t = ((cx - ax) * qy - (cy - ay) * qx) / cross;
    const u = ((cx - ax) * ry - (cy - ay) * rx) / cross;
    if (Number.isFinite(t) && Number.isFinite(u)) return [held(t), held(u)];
  }
  const square = rx * rx + ry * ry;
  const tc = held(((cx - ax) * rx + (cy - ay) * ry) / square);
  const td = held(((dx - ax) * rx + (dy - ay) * ry) / square);
  const t = (tc + td) / 2;
  const along = ((ax + t * rx - cx) * qx + (ay + t * ry - cy) * qy) / (qx * qx + qy * qy);
  return [t, held(along)];
}

function held(value: number): number {
  return Math.min(1, Math.max(0, value));
}
