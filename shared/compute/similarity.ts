import {
  type CentredKnown,
  type ControlPair,
  centredKnown,
  type KnownPlace,
} from '#shared/compute/known-places.ts';

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
 * Least-squares similarity through known places, direct or mirrored. `places`: pixels and section units; each offset and
 * each elevation that is known is one equation, those of a kind shifted to their own centroid before the sums are
 * formed. `rotation`: clockwise turn of the section's level on the sheet in radians where it is known otherwise, null to
 * fit it. Returns null when the pixel places coincide or tell no turn, and with a given turn when they deny it. Source:
 * closed-form two-dimensional conformal fit (Ghilani and Wolf, Adjustment Computations, ch. 18); its normal equations
 * are no longer diagonal when a coordinate is missing.
 */
export function fitSimilarity(
  places: readonly KnownPlace[],
  mirrored: boolean,
  rotation: number | null = null,
): Similarity | null {
  const known = centredKnown(places);
  if (known === null) return null;
  const slope = rotation === null ? freeSlope(known, mirrored) : slopeAlong(known, mirrored, rotation);
  if (slope === null) return null;
  const { re, im } = slope;
  const side = mirrored ? -1 : 1;
  const { sheetOrigin, offsets, elevations } = known;
  const [ox, oy] = [offsets.sheetOrigin[0] - sheetOrigin[0], sheetOrigin[1] - offsets.sheetOrigin[1]];
  const [ex, ey] = [elevations.sheetOrigin[0] - sheetOrigin[0], sheetOrigin[1] - elevations.sheetOrigin[1]];
  return {
    re,
    im,
    sheetOrigin,
    sectionOrigin: [offsets.origin - side * (re * ox - im * oy), elevations.origin - (im * ex + re * ey)],
    mirrored,
  };
}

/** Least part by which the weaker of the two normal equations must stand beside the stronger to tell the turn. */
const TURN_TOLD = 0.01;

function freeSlope(
  { offsets, elevations }: CentredKnown,
  mirrored: boolean,
): { re: number; im: number } | null {
  const side = mirrored ? -1 : 1;
  const rr = offsets.uu + elevations.vv;
  const ii = offsets.vv + elevations.uu;
  const ri = elevations.uv - offsets.uv;
  const bRe = side * offsets.uValue + elevations.vValue;
  const bIm = -side * offsets.vValue + elevations.uValue;
  const mean = (rr + ii) / 2;
  const apart = Math.hypot((rr - ii) / 2, ri);
  if (!(mean > 0) || mean - apart < TURN_TOLD * (mean + apart)) return null;
  const determinant = rr * ii - ri * ri;
  return { re: (bRe * ii - bIm * ri) / determinant, im: (bIm * rr - bRe * ri) / determinant };
}

function slopeAlong(
  { offsets, elevations }: CentredKnown,
  mirrored: boolean,
  rotation: number,
): { re: number; im: number } | null {
  const side = mirrored ? -1 : 1;
  const [cos, sin] = [Math.cos(rotation), Math.sin(rotation)];
  const square =
    offsets.uu * cos * cos -
    2 * offsets.uv * cos * sin +
    offsets.vv * sin * sin +
    elevations.uu * sin * sin +
    2 * elevations.uv * cos * sin +
    elevations.vv * cos * cos;
  const product =
    side * (offsets.uValue * cos - offsets.vValue * sin) + elevations.uValue * sin + elevations.vValue * cos;
  const scale = product / square;
  return Number.isFinite(scale) && scale > 0 ? { re: scale * cos, im: scale * sin } : null;
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
