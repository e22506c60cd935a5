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

function placeWithoutTremor(points: readonly Pair[], along: Float64Array, i: number, tremor: number): Pair {
  const fit = new ParabolaFit(points, along, i);
  // Places and standard deviations, for a tremor of 1, of the fits that agree so far, flat: x y spread.
  const fits = [points[i]![0], points[i]![1], 1];
  for (const window of WINDOWS) {
    if (window > i && window > points.length - 1 - i && fits.length > (3 * WINDOWS.length) / 2) break;
    if (!fit.over(window)) continue;
    if (!agrees(fit, fits, AGREE * tremor)) break;
    fits.push(fit.x, fit.y, fit.spread);
  }
  return [fits[fits.length - 3]!, fits[fits.length - 2]!];
}

function agrees(fit: ParabolaFit, others: readonly number[], allowed: number): boolean {
  for (let k = 0; k < others.length; k += 3) {
    const apart = Math.hypot(fit.x - others[k]!, fit.y - others[k + 1]!);
    if (!(apart <= allowed * (fit.spread + others[k + 2]!))) return false;
  }
  return true;
}

/**
 * The least-squares parabola about a vertex, its sums taken further as the window grows. Numbers in fields of their own:
 * it is worked out for every vertex of a net at each reading.
 */
class ParabolaFit {
  x = 0;
  y = 0;
  spread = 1;
  private s0 = 0;
  private s1 = 0;
  private s2 = 0;
  private s3 = 0;
  private s4 = 0;
  private x0 = 0;
  private x1 = 0;
  private x2 = 0;
  private y0 = 0;
  private y1 = 0;
  private y2 = 0;
  private reached = 0;

  constructor(
    private readonly points: readonly Pair[],
    private readonly along: Float64Array,
    private readonly middle: number,
  ) {
    this.take(middle);
  }

  /** Fits over so many vertices on either side; false where fewer than five are in the window. */
  over(window: number): boolean {
    while (this.reached < window) {
      this.reached += 1;
      this.take(this.middle - this.reached);
      this.take(this.middle + this.reached);
    }
    const { s0, s1, s2, s3, s4 } = this;
    if (s0 < 5) return false;
    // First row of the inverse of the normal equations: the value at the vertex itself.
    const a = s2 * s4 - s3 * s3;
    const b = s2 * s3 - s1 * s4;
    const c = s1 * s3 - s2 * s2;
    const determinant = s0 * a + s1 * b + s2 * c;
    if (!(determinant > 0)) return false;
    const at = this.points[this.middle]!;
    this.x = at[0] + (a * this.x0 + b * this.x1 + c * this.x2) / determinant;
    this.y = at[1] + (a * this.y0 + b * this.y1 + c * this.y2) / determinant;
    this.spread = Math.sqrt(a / determinant);
    return true;
  }

  private take(i: number): void {
    if (i < 0 || i >= this.points.length) return;
    const point = this.points[i]!;
    const at = this.points[this.middle]!;
    const t = this.along[i]! - this.along[this.middle]!;
    const dx = point[0] - at[0];
    const dy = point[1] - at[1];
    const tt = t * t;
    this.s0 += 1;
    this.s1 += t;
    this.s2 += tt;
    this.s3 += tt * t;
    this.s4 += tt * tt;
    this.x0 += dx;
    this.x1 += t * dx;
    this.x2 += tt * dx;
    this.y0 += dy;
    this.y1 += t * dy;
    this.y2 += tt * dy;
  }
}
