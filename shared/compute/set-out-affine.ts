import { centroidOf, type KnownPlace } from '#shared/compute/known-places.ts';
import { leastSquares } from '#shared/compute/least-squares.ts';
import { determinantOf, inverted, type LinearMap, mapped } from '#shared/compute/linear-map.ts';
import { sectionMapOfFit } from '#shared/compute/section-map.ts';
import type { FittedSection } from '#shared/compute/set-out-fit.ts';

/**
 * Least-squares affine map from the sheet to the section, for paper that has stretched unevenly or askew: offset and
 * elevation are each a·u + b·v + c of their own, u and v pixels about the middle of the places, and each known figure is
 * one equation. Pixels and section units. Null when offsets or elevations are known at fewer than three places off one
 * line. Source: two-dimensional affine fit (Ghilani and Wolf, Adjustment Computations, ch. 18).
 */
export function fitAffine(places: readonly KnownPlace[]): FittedSection | null {
  const origin = centroidOf(places.map(({ sheet }) => sheet));
  const reach = Math.max(
    ...places.map(({ sheet }) => Math.hypot(sheet[0] - origin[0], sheet[1] - origin[1])),
  );
  const [offset, elevation] = [
    coordinateFit(places, 0, origin, reach),
    coordinateFit(places, 1, origin, reach),
  ];
  if (offset === null || elevation === null) return null;
  const linear: LinearMap = [offset[0], offset[1], elevation[0], elevation[1]];
  const fitted = sectionOfLinear(linear);
  if (fitted === null) return null;
  const map = sectionMapOfFit({
    linear,
    sheetOrigin: origin,
    sectionOrigin: [offset[2], elevation[2]],
  });
  return { map, ...fitted };
}

/** a, b per pixel and c of one coordinate. */
function coordinateFit(
  places: readonly KnownPlace[],
  axis: 0 | 1,
  origin: readonly [number, number],
  reach: number,
): [a: number, b: number, c: number] | null {
  const known = places.filter(({ section }) => section[axis] !== null);
  const base = known[0]?.section[axis] ?? 0;
  const rows = known.map(({ sheet }) => [(sheet[0] - origin[0]) / reach, (sheet[1] - origin[1]) / reach, 1]);
  const x = leastSquares(
    rows,
    known.map(({ section }) => (section[axis] ?? 0) - base),
  );
  return x === null ? null : [x[0]! / reach, x[1]! / reach, x[2]! + base];
}

/** Scales, turn and handedness of a linear map from sheet to section; null where it flattens the plane. */
export function sectionOfLinear(linear: LinearMap): Omit<FittedSection, 'map'> | null {
  const det = determinantOf(linear);
  const back = inverted(linear);
  const level = mapped(back, 1, 0);
  const up = mapped(back, 0, 1);
  const [levelPx, upPx] = [Math.hypot(...level), Math.hypot(...up)];
  if (det === 0 || !Number.isFinite(levelPx) || !Number.isFinite(upPx) || levelPx === 0 || upPx === 0)
    return null;
  return { along: 1 / levelPx, up: 1 / upPx, rotation: Math.atan2(up[0], -up[1]), mirrored: det > 0 };
}

/** Degrees by which the section's level and its up depart from a right angle on the sheet. */
export function shearDeg(linear: LinearMap): number {
  const back = inverted(linear);
  const [lx, ly] = mapped(back, 1, 0);
  const [ux, uy] = mapped(back, 0, 1);
  const cosine = (lx * ux + ly * uy) / (Math.hypot(lx, ly) * Math.hypot(ux, uy));
  return (Math.asin(Math.min(1, Math.abs(cosine))) * 180) / Math.PI;
}
