import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Vertices on either side of one that a local curve is fitted to, tried from the narrowest to the widest. */
const WINDOWS = [2, 3, 4, 6, 9, 13, 19, 28];
/** Two local curves agree when they differ by no more than so many of their own standard deviations. */
const AGREE = 1.5;
/** Median of the absolute value of a normally spread number of standard deviation 1. */
const MEDIAN_OF_NORMAL = 0.6745;
/** A tremor below this part of the tracing accuracy is none. */
const NO_TREMOR = 0.1;
/** No tremor is taken for larger than so many times the tracing accuracy: what is larger is the line's own shape. */
const MOST_TREMOR = 1.5;

/**
 * The tremor of a traced line: the standard deviation by which its vertices stray across it, in the unit of `points`.
 * Each vertex is held against the cubic through its two neighbours on either side; the median makes corners harmless.
 * 0 for fewer than seven vertices.
 */
export function tremorOf(points: readonly Pair[]): number {
  if (points.length < 7) return 0;
  const along = distancesAlong(points);
  const strays: number[] = [];
  for (let i = 2; i + 2 < points.length; i += 1) strays.push(strayAt(points, along, i));
  strays.sort((a, b) => a - b);
  return strays[strays.length >> 1]! / MEDIAN_OF_NORMAL;
}

/**
 * A traced line without the tremor of the hand: every vertex moved onto a parabola, by the distance along the line,
 * through its neighbours. How many neighbours is settled vertex by vertex: as many as give a place that agrees, within
 * the tremor, with those of all narrower fits. So a corner and a tight bend stay, and a line without tremor comes back
 * as it is. `accuracy`: the tracing accuracy in the unit of the points; the tremor itself is measured on the line.
 * Turning, shifting, mirroring or reversing the line does the same to the result. Source: local polynomials with
 * windows after Lepski (1991); Goldenshluger and Nemirovski (1997).
 */
export function withoutTremor(points: readonly Pair[], accuracy: number): readonly Pair[] {
  const tremor = Math.min(tremorOf(points), MOST_TREMOR * accuracy);
  if (!(tremor > NO_TREMOR * accuracy)) return points;
  const along = distancesAlong(points);
  return points.map((_, i) => placeWithoutTremor(points, along, i, tremor));
}

function distancesAlong(points: readonly Pair[]): Float64Array {
  const along = new Float64Array(points.length);
  for (let i = 1; i < along.length; i += 1) {
    const [a, b] = [points[i - 1]!, points[i]!];
    along[i] = along[i - 1]! + Math.hypot(b[0] - a[0], b[1] - a[1]);
  }
  return along;
}

/** Distance of vertex `i` from the cubic through its four neighbours, for a tremor of standard deviation 1. */
function strayAt(points: readonly Pair[], along: Float64Array, i: number): number {
  const neighbours = [i - 2, i - 1, i + 1, i + 2];
  let dx = points[i]![0];
  let dy = points[i]![1];
  let square = 1;
  for (const j of neighbours) {
    let weight = 1;
    for (const k of neighbours) {
      if (k !== j) weight *= (along[i]! - along[k]!) / (along[j]! - along[k]!);
    }
    dx -= weight * points[j]![0];
    dy -= weight * points[j]![1];
    square += weight * weight;
  }
  return Number.isFinite(square) ? Math.hypot(dx, dy) / Math.sqrt(square) : 0;
}

/** A fitted place and its standard deviation for a tremor of 1. */
type Fit = { readonly at: Pair; readonly spread: number };

function placeWithoutTremor(points: readonly Pair[], along: Float64Array, i: number, tremor: number): Pair {
  const fits: Fit[] = [{ at: points[i]!, spread: 1 }];
  const sums = new ParabolaSums(points, along, i);
  for (const window of WINDOWS) {
    if (window > i && window > points.length - 1 - i && fits.length > WINDOWS.length / 2) break;
    const fit = sums.fitOver(window);
    if (fit === null) continue;
    const agrees = fits.every(
      (other) =>
        Math.hypot(fit.at[0] - other.at[0], fit.at[1] - other.at[1]) <=
        AGREE * tremor * (fit.spread + other.spread),
    );
    if (!agrees) break;
    fits.push(fit);
  }
  return fits[fits.length - 1]!.at;
}

/** Sums for the least squares of a parabola about a vertex, taken further as the window grows. */
class ParabolaSums {
  private readonly s = [0, 0, 0, 0, 0];
  private readonly x = [0, 0, 0];
  private readonly y = [0, 0, 0];
  private reached = 0;

  constructor(
    private readonly points: readonly Pair[],
    private readonly along: Float64Array,
    private readonly middle: number,
  ) {
    this.take(middle);
  }

  /** The parabola's place at the vertex; null where fewer than five vertices are in the window. */
  fitOver(window: number): Fit | null {
    while (this.reached < window) {
      this.reached += 1;
      this.take(this.middle - this.reached);
      this.take(this.middle + this.reached);
    }
    const [n, s1, s2, s3, s4] = this.s as [number, number, number, number, number];
    if (n < 5) return null;
    // First row of the inverse of the normal equations: the value at the vertex itself.
    const [a, b, c] = [s2 * s4 - s3 * s3, s2 * s3 - s1 * s4, s1 * s3 - s2 * s2];
    const determinant = n * a + s1 * b + s2 * c;
    if (!(determinant > 0)) return null;
    const atVertex = ([m0, m1, m2]: readonly number[]) => (a * m0! + b * m1! + c * m2!) / determinant;
    const [px, py] = this.points[this.middle]!;
    return { at: [px + atVertex(this.x), py + atVertex(this.y)], spread: Math.sqrt(a / determinant) };
  }

  private take(i: number): void {
    const point = this.points[i];
    if (point === undefined) return;
    const t = this.along[i]! - this.along[this.middle]!;
    const dx = point[0] - this.points[this.middle]![0];
    const dy = point[1] - this.points[this.middle]![1];
    let power = 1;
    for (let k = 0; k < 5; k += 1) {
      this.s[k] = this.s[k]! + power;
      if (k < 3) {
        this.x[k] = this.x[k]! + power * dx;
        this.y[k] = this.y[k]! + power * dy;
      }
      power *= t;
    }
  }
}
