import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Longest piece of a smooth line, so that it can be bent afterwards, as long as a span has no more than `MOST_EVEN`. */
const LONGEST = 24;
const LEAST_PIECES = 4;
const MOST_EVEN = 16;
/** No span is cut finer than this, whatever was asked. */
const MOST_PIECES = 200;
/** Beyond this turn the first two clicks make a corner, and the curve leaves the end straight. */
const CORNER = Math.PI / 2;

/**
 * The smooth curve through places as a polyline within `tolerance` of it: every place is a vertex, in order; unit and
 * frame of the places. Repeated places count once; two give the straight join, fewer are returned as they are.
 * Source: centripetal Catmull–Rom spline, which makes neither loops nor cusps within a span (Yuksel, Schaefer and
 * Keyser 2011); beyond the ends it goes on with the curvature of the three last places.
 */
export function smoothCurve(places: readonly Pair[], tolerance: number): Pair[] {
  const knots = places.filter((place, i) => i === 0 || !same(place, places[i - 1]!));
  if (knots.length < 3) return knots;
  const n = knots.length;
  const closed = same(knots[0]!, knots[n - 1]!);
  const before = closed ? knots[n - 2]! : beyond(knots[0]!, knots[1]!, knots[2]!);
  const after = closed ? knots[1]! : beyond(knots[n - 1]!, knots[n - 2]!, knots[n - 3]!);
  const line: Pair[] = [knots[0]!];
  for (let i = 0; i + 1 < n; i += 1) {
    const span = spanOf(knots[i - 1] ?? before, knots[i]!, knots[i + 1]!, knots[i + 2] ?? after);
    const pieces = piecesOf(span, tolerance);
    for (let k = 1; k < pieces; k += 1) line.push(placeOn(span, k / pieces));
    line.push(knots[i + 1]!);
  }
  return line;
}

/** A span from `a` to `b` with its derivatives by a parameter from 0 to 1 at both ends. */
type Span = { readonly a: Pair; readonly b: Pair; readonly da: Pair; readonly db: Pair };

function spanOf(before: Pair, a: Pair, b: Pair, after: Pair): Span {
  const [t0, t1, t2] = [rootDistance(before, a), rootDistance(a, b), rootDistance(b, after)];
  return { a, b, da: tangent(before, a, b, t0, t1, t1), db: tangent(a, b, after, t1, t2, t1) };
}

/** Derivative at the middle of three places `before` and `behind` apart in the curve's parameter, for a span of `unit`. */
function tangent(a: Pair, b: Pair, c: Pair, before: number, behind: number, unit: number): Pair {
  const one = (i: 0 | 1) =>
    unit * ((b[i] - a[i]) / before - (c[i] - a[i]) / (before + behind) + (c[i] - b[i]) / behind);
  return [one(0), one(1)];
}

function placeOn({ a, b, da, db }: Span, u: number): Pair {
  const v = 1 - u;
  const [ha, hb] = [v * v * (1 + 2 * u), u * u * (1 + 2 * v)];
  const [hda, hdb] = [u * v * v, -u * u * v];
  return [
    ha * a[0] + hb * b[0] + hda * da[0] + hdb * db[0],
    ha * a[1] + hb * b[1] + hda * da[1] + hdb * db[1],
  ];
}

/**
 * Into how many pieces a span is cut: a chord strays from its arc by an eighth of the second derivative at most, which
 * is linear over the span and so greatest at an end.
 */
function piecesOf({ a, b, da, db }: Span, tolerance: number): number {
  const bend = (i: 0 | 1, u: number) =>
    (12 * u - 6) * (a[i] - b[i]) + (6 * u - 4) * da[i] + (6 * u - 2) * db[i];
  const sharpest = Math.max(Math.hypot(bend(0, 0), bend(1, 0)), Math.hypot(bend(0, 1), bend(1, 1)));
  const even = Math.min(MOST_EVEN, Math.ceil(Math.hypot(b[0] - a[0], b[1] - a[1]) / LONGEST));
  const close = Math.ceil(Math.sqrt(sharpest / (8 * Math.max(tolerance, 1e-9))));
  return Math.min(MOST_PIECES, Math.max(LEAST_PIECES, even, close));
}

/** A place as far beyond the end as the next one is before it, on the bend that the first three places make. */
function beyond(end: Pair, next: Pair, third: Pair): Pair {
  const first: Pair = [next[0] - end[0], next[1] - end[1]];
  const second: Pair = [third[0] - next[0], third[1] - next[1]];
  const [l1, l2] = [Math.hypot(...first), Math.hypot(...second)];
  const turn = Math.atan2(
    first[0] * second[1] - first[1] * second[0],
    first[0] * second[0] + first[1] * second[1],
  );
  const angle = Math.abs(turn) > CORNER ? 0 : -turn * Math.min(1, (2 * l1) / (l1 + l2));
  const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
  return [end[0] - (first[0] * cos - first[1] * sin), end[1] - (first[0] * sin + first[1] * cos)];
}

function rootDistance(a: Pair, b: Pair): number {
  return Math.sqrt(Math.hypot(b[0] - a[0], b[1] - a[1]));
}

function same(a: Pair, b: Pair): boolean {
  return a[0] === b[0] && a[1] === b[1];
}
