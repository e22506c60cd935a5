import { lengthOfVector } from '#shared/compute/geometry/length.ts';

/** The same place of a drawing on two sheets of it, each in its own base-raster pixels, y down. */
export type MatchedPlace = {
  readonly from: readonly [x: number, y: number];
  readonly to: readonly [x: number, y: number];
};

/**
 * How one sheet lies on the other. `similarity`: turned, shifted, at another scale, as two scans of one sheet do;
 * `affine`: besides, stretched otherwise along and across, and sheared, as paper and copies are.
 */
export type MatchShape = 'similarity' | 'affine';

/** Fewest places that leave nothing open. */
export const FEWEST_PLACES: Record<MatchShape, number> = { similarity: 2, affine: 3 };

/** X = a·(x − x0) + b·(y − y0) + X0, Y = c·(x − x0) + d·(y − y0) + Y0: origins apart, so that no figure is lost. */
export type SheetMatch = {
  readonly shape: MatchShape;
  readonly linear: readonly [a: number, b: number, c: number, d: number];
  readonly fromOrigin: readonly [x: number, y: number];
  readonly toOrigin: readonly [x: number, y: number];
};

/** How well the places agree with the match. Pixels of the sheet carried to. */
export type MatchResiduals = {
  /** Distance of each place from where the match puts it, in the order given. */
  readonly each: readonly number[];
  /**
   * Standard deviation of one coordinate, √(Σv²/(2n − u)) with u parameters; null when no place is left over, so that
   * nothing can be said of the accuracy.
   */
  readonly sigmaPx: number | null;
};

/** Places on one line within this part of their spread tell nothing across it. */
const ON_ONE_LINE = 1e-6;

/**
 * The least-squares match of two sheets through places given on both; null when the places are too few for the shape,
 * coincide, lie on one line where the shape asks for more, or would have the sheet mirrored or flattened. Source:
 * two-dimensional conformal and affine coordinate transformation (Ghilani and Wolf, Adjustment Computations, ch. 18).
 */
export function matchSheets(places: readonly MatchedPlace[], shape: MatchShape): SheetMatch | null {
  if (places.length < FEWEST_PLACES[shape]) return null;
  const fromOrigin = middleOf(places.map(({ from }) => from));
  const toOrigin = middleOf(places.map(({ to }) => to));
  const sums = sumsOf(places, fromOrigin, toOrigin);
  const linear = shape === 'similarity' ? similarityOf(sums) : affineOf(sums);
  if (linear === null) return null;
  const [a, b, c, d] = linear;
  // A scan may be turned about, but no scan of a drawing is its mirror image.
  if (!(a * d - b * c > 0)) return null;
  return { shape, linear, fromOrigin, toOrigin };
}

/** Where a place of the sheet carried from lies on the sheet carried to; pixels in, pixels out. */
export function matched(match: SheetMatch, x: number, y: number): [x: number, y: number] {
  const [a, b, c, d] = match.linear;
  const dx = x - match.fromOrigin[0];
  const dy = y - match.fromOrigin[1];
  return [a * dx + b * dy + match.toOrigin[0], c * dx + d * dy + match.toOrigin[1]];
}

export function matchResiduals(match: SheetMatch, places: readonly MatchedPlace[]): MatchResiduals {
  const each = places.map(({ from, to }) => {
    const [x, y] = matched(match, from[0], from[1]);
    return lengthOfVector(to[0] - x, to[1] - y);
  });
  const left = 2 * places.length - 2 * FEWEST_PLACES[match.shape];
  const square = each.reduce((sum, length) => sum + length * length, 0);
  return { each, sigmaPx: left > 0 ? Math.sqrt(square / left) : null };
}

/** Pixels of the sheet carried to for one of the sheet carried from: the root of the change of area. */
export function scaleOf({ linear: [a, b, c, d] }: SheetMatch): number {
  return Math.sqrt(a * d - b * c);
}

/** How far the sheet is turned, clockwise as displayed, radians between −π and π. */
export function turnOf({ linear: [a, b, c, d] }: SheetMatch): number {
  return Math.atan2(c - b, a + d);
}

function middleOf(places: ReadonlyArray<readonly [number, number]>): [number, number] {
  const sum = places.reduce(([sx, sy], [x, y]) => [sx + x, sy + y] as [number, number], [0, 0]);
  return [sum[0] / places.length, sum[1] / places.length];
}

/** Sums of squares and products about the middles; x, y on the sheet carried from, X, Y on the other. */
type Sums = { xx: number; xy: number; yy: number; xX: number; yX: number; xY: number; yY: number };

function sumsOf(
  places: readonly MatchedPlace[],
  [x0, y0]: readonly [number, number],
  [X0, Y0]: readonly [number, number],
): Sums {
  const sums: Sums = { xx: 0, xy: 0, yy: 0, xX: 0, yX: 0, xY: 0, yY: 0 };
  for (const { from, to } of places) {
    const [x, y] = [from[0] - x0, from[1] - y0];
    const [X, Y] = [to[0] - X0, to[1] - Y0];
    sums.xx += x * x;
    sums.xy += x * y;
    sums.yy += y * y;
    sums.xX += x * X;
    sums.yX += y * X;
    sums.xY += x * Y;
    sums.yY += y * Y;
  }
  return sums;
}

function similarityOf({ xx, yy, xX, yX, xY, yY }: Sums): SheetMatch['linear'] | null {
  const square = xx + yy;
  if (!(square > 0)) return null;
  const re = (xX + yY) / square;
  const im = (xY - yX) / square;
  return [re, -im, im, re];
}

function affineOf({ xx, xy, yy, xX, yX, xY, yY }: Sums): SheetMatch['linear'] | null {
  const determinant = xx * yy - xy * xy;
  if (!(determinant > ON_ONE_LINE * (xx + yy) * (xx + yy))) return null;
  return [
    (xX * yy - yX * xy) / determinant,
    (yX * xx - xX * xy) / determinant,
    (xY * yy - yY * xy) / determinant,
    (yY * xx - xY * xy) / determinant,
  ];
}
