import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { nearestOnPolyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Over this length of a densely traced end its direction is settled, in the unit of the points. */
const END_LENGTH = 24;
/** So many vertices are needed to fit a curve to an end; with fewer its last segment says where it goes. */
const ENOUGH = 5;
/** An end nearer than this to the other line ends on it already. */
const ON_LINE = 0.01;

/** A target of an extension: any line of the sheet, with its id. */
export type ExtendTarget = { readonly id: string; readonly points: readonly Pair[] };

/** A line extended at one end: its new points, the piece that was added, and what it has met. */
export type Extended = {
  readonly points: readonly Pair[];
  readonly added: readonly [Pair, Pair];
  readonly targetId: string;
  readonly atStart: boolean;
};

/**
 * The direction in which a line leaves its end, a unit vector in the frame of the points: the derivative at the end of
 * the least-squares parabola through the vertices of the last 24 units when there are five or more, so that the tremor
 * of the hand is evened out; the last segment otherwise. Null when the line has no length.
 */
export function endDirection(points: readonly Pair[], atStart: boolean): Pair | null {
  const from = atStart ? points : [...points].reverse();
  const end = from[0];
  if (end === undefined) return null;
  const near: Pair[] = [];
  const along: number[] = [];
  let s = 0;
  for (const point of from) {
    const before = near.at(-1);
    const step = before === undefined ? 0 : Math.hypot(point[0] - before[0], point[1] - before[1]);
    if (before !== undefined && step === 0) continue;
    s += step;
    if (s > END_LENGTH && near.length >= 2) break;
    near.push(point);
    along.push(s);
  }
  if (near.length < 2) return null;
  const slope = near.length >= ENOUGH ? slopeAtStart(near, along) : null;
  return unit(slope ?? [near[1]![0] - end[0], near[1]![1] - end[1]]);
}

function unit([dx, dy]: Pair): Pair | null {
  const length = Math.hypot(dx, dy);
  // From the end inwards, so that leaving it is the other way.
  return length > 0 ? [-dx / length, -dy / length] : null;
}

/** Derivative at 0 of the least-squares parabola of both coordinates over `along`; null when it is not determined. */
function slopeAtStart(points: readonly Pair[], along: readonly number[]): Pair | null {
  const length = along.at(-1)!;
  const sums = [0, 0, 0, 0, 0];
  const right = [
    [0, 0],
    [0, 0],
    [0, 0],
  ];
  points.forEach((point, i) => {
    const t = along[i]! / length;
    let power = 1;
    for (let k = 0; k < 5; k += 1) {
      sums[k]! += power;
      if (k < 3) {
        right[k]![0]! += power * point[0];
        right[k]![1]! += power * point[1];
      }
      power *= t;
    }
  });
  const [s0, s1, s2, s3, s4] = sums as [number, number, number, number, number];
  // Second row of the inverse of the normal equations: the slope.
  const a = s2 * s3 - s1 * s4;
  const b = s0 * s4 - s2 * s2;
  const c = s1 * s2 - s0 * s3;
  const determinant = s1 * a + s2 * b + s3 * c;
  const whole = s0 * (s2 * s4 - s3 * s3) - s1 * (s1 * s4 - s2 * s3) + s2 * (s1 * s3 - s2 * s2);
  if (!(Math.abs(whole) > 1e-12) || !Number.isFinite(determinant)) return null;
  const of = (axis: 0 | 1) => (a * right[0]![axis]! + b * right[1]![axis]! + c * right[2]![axis]!) / whole;
  return [of(0), of(1)];
}

/**
 * Extends one end of a line, straight on in its direction, to the first of the targets that it meets within `reach`,
 * one frame and unit. Vertices that were there are the same pairs as before. Null when it meets none.
 */
export function extendedAt(
  points: readonly Pair[],
  atStart: boolean,
  targets: readonly ExtendTarget[],
  reach: number,
): Extended | null {
  const end = atStart ? points[0] : points.at(-1);
  const direction = endDirection(points, atStart);
  if (end === undefined || direction === null) return null;
  const ray = polylineOf([end, [end[0] + reach * direction[0], end[1] + reach * direction[1]]]);
  if (ray === null) return null;
  let best: { s: number; at: Pair; id: string } | null = null;
  for (const { id, points: others } of targets) {
    const target = polylineOf(others);
    if (target === null) continue;
    const met = crossingsOf(ray, target).find(({ s }) => s > ON_LINE);
    if (met !== undefined && (best === null || met.s < best.s)) best = { s: met.s, at: met.at, id };
  }
  if (best === null) return null;
  return {
    points: atStart ? [best.at, ...points] : [...points, best.at],
    added: [end, best.at],
    targetId: best.id,
    atStart,
  };
}

/** Extends the end of a line that has the shorter way to the target; null when neither end meets it within `reach`. */
export function extendedTo(points: readonly Pair[], target: ExtendTarget, reach: number): Extended | null {
  const both = [true, false].flatMap((atStart) => extendedAt(points, atStart, [target], reach) ?? []);
  const length = ({ added: [a, b] }: Extended) => Math.hypot(b[0] - a[0], b[1] - a[1]);
  return both.sort((a, b) => length(a) - length(b))[0] ?? null;
}

/** True when an end of a line lies on another one already, to a hundredth of the unit of the points. */
export function endsOn(points: readonly Pair[], other: readonly Pair[]): boolean {
  const line = polylineOf(other);
  if (line === null) return false;
  return [points[0], points.at(-1)].some(
    (end) => end !== undefined && nearestOnPolyline(line, end[0], end[1]).distance <= ON_LINE,
  );
}
