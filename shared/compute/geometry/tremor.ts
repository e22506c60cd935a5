import { lengthOfVector } from '#shared/compute/geometry/length.ts';
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
  const fit = new ParabolaFit(points, distancesAlong(points));
  const fits = new Float64Array(3 * (WINDOWS.length + 1));
  return points.map((_, i) => placeWithoutTremor(points, fit, i, tremor, fits));
}

function distancesAlong(points: readonly Pair[]): Float64Array {
  const along = new Float64Array(points.length);
  for (let i = 1; i < along.length; i += 1) {
    const a = points[i - 1]!;
    const b = points[i]!;
    along[i] = along[i - 1]! + lengthOfVector(b[0] - a[0], b[1] - a[1]);
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
  return Number.isFinite(square) ? lengthOfVector(dx, dy) / Math.sqrt(square) : 0;
}

/** `fits`: places and standard deviations, for a tremor of 1, of the fits that agree so far, flat: x y spread. */
function placeWithoutTremor(
  points: readonly Pair[],
  fit: ParabolaFit,
  i: number,
  tremor: number,
  fits: Float64Array,
): Pair {
  fit.about(i);
  fits[0] = points[i]![0];
  fits[1] = points[i]![1];
  fits[2] = 1;
  let used = 3;
  for (let w = 0; w < WINDOWS.length; w += 1) {
    const window = WINDOWS[w]!;
    if (window > i && window > points.length - 1 - i && used > (3 * WINDOWS.length) / 2) break;
    if (!fit.over(window)) continue;
    if (!agrees(fit.found, fits, used, AGREE * tremor)) break;
    fits.set(fit.found, used);
    used += 3;
  }
  return [fits[used - 3]!, fits[used - 2]!];
}

function agrees(found: Float64Array, others: Float64Array, used: number, allowed: number): boolean {
  for (let k = 0; k < used; k += 3) {
    const apart = lengthOfVector(found[0]! - others[k]!, found[1]! - others[k + 1]!);
    if (!(apart <= allowed * (found[2]! + others[k + 2]!))) return false;
  }
  return true;
}

/**
 * The least-squares parabola about a vertex, its sums taken further as the window grows. The sums lie in one array, and
 * one fit serves all vertices: it is worked out for every vertex of a net at each reading, and a number that changes in
 * an object's field costs a new one on the heap each time.
 */
class ParabolaFit {
  /** Place of the vertex by the fit, and its standard deviation for a tremor of 1: x y spread. */
  readonly found = new Float64Array(3);
  /** Sums of t⁰ to t⁴, of x·t⁰ to x·t², and of y·t⁰ to y·t², all from the vertex. */
  private readonly sums = new Float64Array(11);
  private middle = 0;
  private reached = 0;

  constructor(
    private readonly points: readonly Pair[],
    private readonly along: Float64Array,
  ) {}

  about(middle: number): void {
    this.middle = middle;
    this.reached = 0;
    this.sums.fill(0);
    this.take(middle);
  }

  /** Fits over so many vertices on either side; false where fewer than five are in the window. */
  over(window: number): boolean {
    while (this.reached < window) {
      this.reached += 1;
      this.take(this.middle - this.reached);
      this.take(this.middle + this.reached);
    }
    const { sums } = this;
    const s0 = sums[0]!;
    if (s0 < 5) return false;
    const s1 = sums[1]!;
    const s2 = sums[2]!;
    const s3 = sums[3]!;
    const s4 = sums[4]!;
    // First row of the inverse of the normal equations: the value at the vertex itself.
    const a = s2 * s4 - s3 * s3;
    const b = s2 * s3 - s1 * s4;
    const c = s1 * s3 - s2 * s2;
    const determinant = s0 * a + s1 * b + s2 * c;
    if (!(determinant > 0)) return false;
    const at = this.points[this.middle]!;
    this.found[0] = at[0] + (a * sums[5]! + b * sums[6]! + c * sums[7]!) / determinant;
    this.found[1] = at[1] + (a * sums[8]! + b * sums[9]! + c * sums[10]!) / determinant;
    this.found[2] = Math.sqrt(a / determinant);
    return true;
  }

  private take(i: number): void {
    if (i < 0 || i >= this.points.length) return;
    const { sums } = this;
    const point = this.points[i]!;
    const at = this.points[this.middle]!;
    const t = this.along[i]! - this.along[this.middle]!;
    const dx = point[0] - at[0];
    const dy = point[1] - at[1];
    const tt = t * t;
    sums[0] = sums[0]! + 1;
    sums[1] = sums[1]! + t;
    sums[2] = sums[2]! + tt;
    sums[3] = sums[3]! + tt * t;
    sums[4] = sums[4]! + tt * tt;
    sums[5] = sums[5]! + dx;
    sums[6] = sums[6]! + t * dx;
    sums[7] = sums[7]! + tt * dx;
    sums[8] = sums[8]! + dy;
    sums[9] = sums[9]! + t * dy;
    sums[10] = sums[10]! + tt * dy;
  }
}
