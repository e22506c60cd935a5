/**
 * A similarity from the sheet to the section, with optional mirror.
 *
 * With the sheet seen as a plane whose y axis points up (w = x − iy) and s = −1 when mirrored, else 1:
 * s·X + iZ = m·(w − w0) + c, where m = re + i·im. The shifts w0 and c are kept apart, so that large coordinates
 * (a chainage of 250,000, an elevation of 3,000) lose no figures.
 */
export type Similarity = {
  readonly re: number;
  readonly im: number;
  readonly sheetOrigin: readonly [x: number, y: number];
  readonly sectionOrigin: readonly [offset: number, elevation: number];
  readonly mirrored: boolean;
};

/** A pair of places that belong together: base-raster pixels and section coordinates. */
export type ControlPair = {
  readonly sheet: readonly [x: number, y: number];
  readonly section: readonly [offset: number, elevation: number];
};

/**
 * Section coordinates of a place on the sheet. `x`, `y`: base-raster pixels, y down; the answer is offset and
 * elevation in section units. No degenerate case: a zero scale sends everything to the section origin.
 */
export function similarityForward(
  map: Similarity,
  x: number,
  y: number,
): [offset: number, elevation: number] {
  const u = x - map.sheetOrigin[0];
  const v = map.sheetOrigin[1] - y;
  const along = map.re * u - map.im * v;
  const up = map.im * u + map.re * v;
  return [map.sectionOrigin[0] + (map.mirrored ? -along : along), map.sectionOrigin[1] + up];
}

/**
 * Place on the sheet of section coordinates, the inverse of `similarityForward`. `offset`, `elevation`: section
 * units; the answer is base-raster pixels, y down. Not finite when the scale is zero.
 */
export function similarityBackward(
  map: Similarity,
  offset: number,
  elevation: number,
): [x: number, y: number] {
  const along = (offset - map.sectionOrigin[0]) * (map.mirrored ? -1 : 1);
  const up = elevation - map.sectionOrigin[1];
  const square = map.re * map.re + map.im * map.im;
  const u = (map.re * along + map.im * up) / square;
  const v = (map.re * up - map.im * along) / square;
  return [map.sheetOrigin[0] + u, map.sheetOrigin[1] - v];
}

/**
 * Least-squares similarity through control pairs, direct or mirrored. `pairs`: at least two, in pixels and section
 * units; both sides are shifted to their centroids before the sums are formed. Returns null when the pixel places
 * coincide. Source: closed-form two-dimensional conformal fit (Ghilani and Wolf, Adjustment Computations, ch. 18).
 */
export function fitSimilarity(pairs: readonly ControlPair[], mirrored: boolean): Similarity | null {
  const sheetOrigin = centroidOf(pairs.map((pair) => pair.sheet));
  const sectionOrigin = centroidOf(pairs.map((pair) => pair.section));
  let re = 0;
  let im = 0;
  let square = 0;
  for (const { sheet, section } of pairs) {
    const u = sheet[0] - sheetOrigin[0];
    const v = sheetOrigin[1] - sheet[1];
    const along = (section[0] - sectionOrigin[0]) * (mirrored ? -1 : 1);
    const up = section[1] - sectionOrigin[1];
    re += u * along + v * up;
    im += u * up - v * along;
    square += u * u + v * v;
  }
  if (!(square > 0)) return null;
  return { re: re / square, im: im / square, sheetOrigin, sectionOrigin, mirrored };
}

/** Section units per pixel of a similarity; never negative. */
export function similarityScale(map: Similarity): number {
  return Math.hypot(map.re, map.im);
}

/**
 * Angle of the section's horizontal on the sheet in radians, clockwise positive as seen on the sheet, within
 * (−π, π]. It is also the angle by which the section's up departs clockwise from the sheet's own up.
 */
export function similarityRotation(map: Similarity): number {
  return Math.atan2(map.im, map.re);
}

/** Residual of a control pair, fitted minus given, section units: offset then elevation. */
export function similarityResidual(map: Similarity, pair: ControlPair): [offset: number, elevation: number] {
  const [offset, elevation] = similarityForward(map, pair.sheet[0], pair.sheet[1]);
  return [offset - pair.section[0], elevation - pair.section[1]];
}

/** Mean of places; the first is taken off before the sum, so that large coordinates lose no figures. */
export function centroidOf(points: ReadonlyArray<readonly [number, number]>): [number, number] {
  const first = points[0] ?? [0, 0];
  let x = 0;
  let y = 0;
  for (const point of points) {
    x += point[0] - first[0];
    y += point[1] - first[1];
  }
  return [first[0] + x / points.length, first[1] + y / points.length];
}
