import type { SheetPx } from '#shared/compute/frames.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { type Polyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { saturatedUnitWeight } from '#shared/compute/quantities/gradients.ts';
import type { SoilGround } from '#shared/compute/soils/soil-ground.ts';

/** Pieces into which the column of soil above a place is cut to find the soils in it. */
const PIECES = 24;

/**
 * Weight of the soil vertically above a place, Σγ·Δz up to the ground, in γw's unit times the length unit (kPa or
 * lb/ft²): the saturated weight below the phreatic line, the moist one above it (the saturated one where no moist one is
 * given), each soil its own. The water that stands on the ground is no part of it. Null where no ground is traced above,
 * where an impervious boundary lies in between (the weight of a structure is not known), and where the weight of a soil
 * in the column is not known.
 */
export function overburdenAt(at: SheetPx, ground: ReadingGround, soils: SoilGround): number | null {
  const up = rayUp(at, ground);
  const top = up === null ? null : firstAlong(up, ground.faces);
  if (up === null || top === null || isRoofed(up, top, ground)) return null;
  const wet = firstAlong(up, ground.phreaticLines) ?? top;
  const depth = top * ground.map.lengthPerPxAlong(...ground.map.up);
  let weight = 0;
  for (let i = 0; i < PIECES; i += 1) {
    const s = ((i + 0.5) / PIECES) * top;
    const { value } = soils.soilAt(at[0] + s * ground.map.up[0], at[1] + s * ground.map.up[1]);
    const saturated = saturatedUnitWeight(value, ground.gammaW);
    const unitWeight = s <= wet ? saturated : (value.moistUnitWeight ?? saturated);
    if (unitWeight === null) return null;
    weight += (unitWeight * depth) / PIECES;
  }
  return weight;
}

/** A straight way up that passes every line above the place; null when there is none. */
function rayUp(at: SheetPx, { map, faces, phreaticLines }: ReadingGround): Polyline | null {
  const far = Math.max(
    0,
    ...[...faces, ...phreaticLines].map(({ box }) =>
      Math.max(
        Math.hypot(box.minX - at[0], box.minY - at[1]),
        Math.hypot(box.maxX - at[0], box.minY - at[1]),
        Math.hypot(box.minX - at[0], box.maxY - at[1]),
        Math.hypot(box.maxX - at[0], box.maxY - at[1]),
      ),
    ),
  );
  return polylineOf([
    [at[0], at[1]],
    [at[0] + map.up[0] * far, at[1] + map.up[1] * far],
  ]);
}

function isRoofed(up: Polyline, top: number, { walls, phreaticLines }: ReadingGround): boolean {
  const met = firstAlong(
    up,
    walls.filter((wall) => !phreaticLines.includes(wall)),
  );
  return met !== null && met < top;
}

/** Distance along a ray at which it first meets one of the lines; null when it meets none. */
function firstAlong(ray: Polyline, lines: readonly Polyline[]): number | null {
  const met = lines.flatMap((line) => crossingsOf(ray, line).map(({ s }) => s));
  return met.length > 0 ? Math.min(...met) : null;
}
