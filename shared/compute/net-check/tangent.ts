import { angleBetween } from '#shared/compute/cells/quadrilateral.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { type Polyline, pointAlong, segmentAlong } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Direction of a traced line at a place, and how far the tracing may have turned it (standard deviation, radians). */
export type Tangent = { readonly direction: Pair; readonly tremor: number };

type Sample = { readonly by: number; readonly at: Pair };

/** Vertices that a fit to a freely curved line takes at least, so that tremor and curve can be told apart. */
const LEAST_VERTICES = 5;
/** At an end the vertices of a fit may lie this many windows away. */
const MOST_WINDOWS = 2;
const BEND_PART = 0.25;
/** Places at which a straight-sided boundary is sampled. */
const SAMPLES = 9;

/**
 * Direction of a curved traced line at distance `s`: a parabola in the distance along the line is fitted to its
 * vertices within `window` to either side, or to the five nearest where there are fewer, since one 3-pixel segment says
 * nothing but how the hand trembled. Least squares; the tremor follows from `accuracyPx`, the standard deviation of a
 * vertex, or from what the vertices stray from the parabola where that is more. All in one frame's pixels.
 */
export function tangentOfCurve(shape: Polyline, s: number, window: number, accuracyPx: number): Tangent {
  const samples = verticesAbout(shape, s, window);
  const [back, on] = [-samples[0]!.by, samples[samples.length - 1]!.by];
  const isEnd = Math.min(back, on) < window / 2;
  if (isEnd && Math.max(back, on) > MOST_WINDOWS * window)
    return tangentAtSparseEnd(samples, shape, s, accuracyPx);
  return fitted(samples, samples.length, accuracyPx) ?? chordAt(shape, s, accuracyPx);
}

/**
 * Direction at an end of a line whose vertices lie far apart: of the parabola through the three next to it. How the line
 * bends between them nobody has traced: a quarter of the bend from the first to the second piece counts as the standard
 * deviation of the direction.
 */
function tangentAtSparseEnd(
  samples: readonly Sample[],
  shape: Polyline,
  s: number,
  accuracyPx: number,
): Tangent {
  const nearest = [...samples].sort((a, b) => Math.abs(a.by) - Math.abs(b.by)).slice(0, 3);
  const found = fitted(nearest, nearest.length, accuracyPx);
  if (found === null) return chordAt(shape, s, accuracyPx);
  const [a, b, c] = [...nearest].sort((first, second) => first.by - second.by).map(({ at }) => at) as [
    Pair,
    Pair,
    Pair,
  ];
  const bend = angleBetween([b[0] - a[0], b[1] - a[1]], [c[0] - b[0], c[1] - b[1]]);
  return { ...found, tremor: lengthOfVector(found.tremor, (BEND_PART * bend * Math.PI) / 180) };
}

/**
 * Direction of a boundary that may be straight from corner to corner, at distance `s`: a parabola fitted to places
 * evenly spread within `window` to either side. As `tangentOfCurve` otherwise.
 */
export function tangentOfBoundary(shape: Polyline, s: number, window: number, accuracyPx: number): Tangent {
  const length = shape.cum[shape.cum.length - 1]!;
  const from = Math.max(0, s - window);
  const to = Math.min(length, s + window);
  const samples = Array.from({ length: SAMPLES }, (_, i): Sample => {
    const along = from + ((to - from) * i) / (SAMPLES - 1);
    return { by: along - s, at: pointAlong(shape, along) };
  });
  const vertices = shape.cum.filter((along) => along >= from && along <= to).length;
  return fitted(samples, Math.max(2, vertices), accuracyPx) ?? chordAt(shape, s, accuracyPx);
}

function verticesAbout(shape: Polyline, s: number, window: number): Sample[] {
  const { cum, xy } = shape;
  let first = segmentAlong(shape, s);
  let last = first + 1;
  const wants = (i: number) => i >= 0 && i < cum.length;
  for (;;) {
    const before = wants(first - 1) ? s - cum[first - 1]! : Number.POSITIVE_INFINITY;
    const after = wants(last + 1) ? cum[last + 1]! - s : Number.POSITIVE_INFINITY;
    const next = Math.min(before, after);
    if (!Number.isFinite(next) || (next > window && last - first + 1 >= LEAST_VERTICES)) break;
    if (before <= after) first -= 1;
    else last += 1;
  }
  return Array.from({ length: last - first + 1 }, (_, k): Sample => {
    const i = first + k;
    return { by: cum[i]! - s, at: [xy[2 * i]!, xy[2 * i + 1]!] };
  });
}

/** Slope at 0 of the parabola (of the straight line through two samples) and its tremor; null when it has no direction. */
function fitted(samples: readonly Sample[], independent: number, accuracyPx: number): Tangent | null {
  const scale = Math.max(...samples.map(({ by }) => Math.abs(by)));
  if (samples.length < 3 || !(scale > 0)) return null;
  const sums = [0, 0, 0, 0, 0];
  const x = [0, 0, 0];
  const y = [0, 0, 0];
  const [originX, originY] = samples[0]!.at;
  for (const { by, at } of samples) {
    let power = 1;
    for (let k = 0; k < 5; k += 1) {
      sums[k]! += power;
      if (k < 3) {
        x[k]! += power * (at[0] - originX);
        y[k]! += power * (at[1] - originY);
      }
      power *= by / scale;
    }
  }
  const rows = inverseOf(sums);
  if (rows === null) return null;
  const [xs, ys] = [rows.map((row) => dot(row, x)), rows.map((row) => dot(row, y))];
  const size = lengthOfVector(xs[1]!, ys[1]!);
  if (!(size > 0)) return null;
  const square = samples.reduce((sum, { by, at }) => {
    const t = by / scale;
    const ex = xs[0]! + t * (xs[1]! + t * xs[2]!) - (at[0] - originX);
    const ey = ys[0]! + t * (ys[1]! + t * ys[2]!) - (at[1] - originY);
    return sum + ex * ex + ey * ey;
  }, 0);
  // A line that bends within the window as no parabola does is known no better than by what it strays from one.
  const strays = samples.length > 3 ? Math.sqrt(square / (samples.length - 3)) : 0;
  const spread = Math.sqrt((Math.max(0, rows[1]![1]!) * samples.length) / independent);
  return {
    direction: [xs[1]! / size, ys[1]! / size],
    tremor: (Math.max(accuracyPx, strays) * spread) / size,
  };
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a[0]! * b[0]! + a[1]! * b[1]! + a[2]! * b[2]!;
}

/** Inverse of the normal matrix [[s0 s1 s2][s1 s2 s3][s2 s3 s4]]; null when it is singular. */
function inverseOf(sums: readonly number[]): number[][] | null {
  const [s0, s1, s2, s3, s4] = sums as [number, number, number, number, number];
  const c00 = s2 * s4 - s3 * s3;
  const c01 = s2 * s3 - s1 * s4;
  const c02 = s1 * s3 - s2 * s2;
  const determinant = s0 * c00 + s1 * c01 + s2 * c02;
  if (!(Math.abs(determinant) > 1e-12 * s0 ** 3)) return null;
  return [
    [c00, c01, c02],
    [c01, s0 * s4 - s2 * s2, s1 * s2 - s0 * s3],
    [c02, s1 * s2 - s0 * s3, s0 * s2 - s1 * s1],
  ].map((row) => row.map((entry) => entry / determinant));
}

/** Direction of the segment at `s`, or of the shortest run of segments round it that has one. */
function chordAt(shape: Polyline, s: number, accuracyPx: number): Tangent {
  const { cum, xy } = shape;
  const count = cum.length;
  let first = segmentAlong(shape, s);
  let last = first + 1;
  for (;;) {
    const across: Pair = [xy[2 * last]! - xy[2 * first]!, xy[2 * last + 1]! - xy[2 * first + 1]!];
    const length = lengthOfVector(...across);
    if (length > 0) {
      const direction: Pair = [across[0] / length, across[1] / length];
      // A direction that the tracing leaves open altogether is off by no more than a quarter turn.
      return { direction, tremor: Math.min(Math.PI / 2, (Math.SQRT2 * accuracyPx) / length) };
    }
    if (first === 0 && last === count - 1) return { direction: [1, 0], tremor: Math.PI / 2 };
    first = Math.max(0, first - 1);
    last = Math.min(count - 1, last + 1);
  }
}
