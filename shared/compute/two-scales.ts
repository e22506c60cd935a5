import { type CentredKnown, centredKnown, type KnownPlace } from '#shared/compute/known-places.ts';
import type { SectionFit } from '#shared/compute/section-map.ts';

/**
 * A turn of the sheet and one scale for each direction of the section, without shear: with u = x − x0 and v = y0 − y,
 * ±(X − X0) = along·(u·cos θ − v·sin θ) and Z − Z0 = up·(u·sin θ + v·cos θ).
 */
export type TwoScales = {
  /** Section units per pixel along the level and upwards, both above zero. */
  readonly along: number;
  readonly up: number;
  /** θ: clockwise turn of the section's level on the sheet, radians within (−π, π]. */
  readonly rotation: number;
  readonly mirrored: boolean;
  readonly sheetOrigin: readonly [x: number, y: number];
  readonly sectionOrigin: readonly [offset: number, elevation: number];
};

/** Least part of the spread of the points by which they must tell one turn from another. */
const TURN_TOLD = 0.1;

/**
 * Least-squares fit of two scales, in pixels. With w = (u, v) the clicks, e₁ = (cos θ, −sin θ) and e₂ = (sin θ, cos θ),
 * each known offset is one equation e₁·w = p·X + c₁ and each known elevation one e₂·w = q·Z + c₂; the sum of their
 * squares is least. For a given θ, p = Σ(w·e₁)X/ΣX² and q = Σ(w·e₂)Z/ΣZ², each about the centroid of its own equations;
 * what is then left to be made least is a quadratic form in (cos θ, sin θ), so that θ is its principal axis. `rotation`:
 * θ where it is known, null to fit it. Pixels and section units. Null when offsets or elevations do not differ, or when
 * the points tell no turn, as when all offsets are known along one line and all elevations along another. Own
 * derivation, an orthogonal affine fit.
 */
export function fitTwoScales(places: readonly KnownPlace[], rotation: number | null): TwoScales | null {
  const known = centredKnown(places);
  if (known === null) return null;
  const { sheetOrigin, offsets, elevations } = known;
  if (!(offsets.values > 0) || !(elevations.values > 0)) return null;
  const turn = rotation ?? principalTurn(known);
  if (turn === null) return null;
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  const p = (offsets.uValue * cos - offsets.vValue * sin) / offsets.values;
  const q = (elevations.uValue * sin + elevations.vValue * cos) / elevations.values;
  if (p === 0 || q === 0) return null;
  const [ou, ov] = [offsets.sheetOrigin[0] - sheetOrigin[0], sheetOrigin[1] - offsets.sheetOrigin[1]];
  const [eu, ev] = [elevations.sheetOrigin[0] - sheetOrigin[0], sheetOrigin[1] - elevations.sheetOrigin[1]];
  // Half a turn more changes the sign of both: up is where elevations grow.
  const flipped = q < 0;
  return {
    along: 1 / Math.abs(p),
    up: 1 / Math.abs(q),
    rotation: flipped ? Math.atan2(-sin, -cos) : Math.atan2(sin, cos),
    mirrored: flipped ? p > 0 : p < 0,
    sheetOrigin,
    sectionOrigin: [
      offsets.origin - (ou * cos - ov * sin) / p,
      elevations.origin - (eu * sin + ev * cos) / q,
    ],
  };
}

/** θ that fits best; null where the points hardly tell it. */
function principalTurn({ offsets: o, elevations: e }: CentredKnown): number | null {
  const cc = (o.uValue * o.uValue) / o.values + (e.vValue * e.vValue) / e.values - (o.uu + e.vv);
  const ss = (o.vValue * o.vValue) / o.values + (e.uValue * e.uValue) / e.values - (o.vv + e.uu);
  const cs = (e.uValue * e.vValue) / e.values - (o.uValue * o.vValue) / o.values - (e.uv - o.uv);
  const told = Math.hypot(cc - ss, 2 * cs);
  const spread = (o.uu + o.vv + e.uu + e.vv) / 2;
  if (!(spread > 0) || !(Math.sqrt(told / spread) >= TURN_TOLD)) return null;
  return Math.atan2(2 * cs, cc - ss) / 2;
}

/** The linear map that the two scales make between sheet and section. */
export function sectionFitOf(fit: TwoScales): SectionFit {
  const side = fit.mirrored ? -fit.along : fit.along;
  const [cos, sin] = [Math.cos(fit.rotation), Math.sin(fit.rotation)];
  return {
    linear: [side * cos, side * sin, fit.up * sin, -fit.up * cos],
    sheetOrigin: fit.sheetOrigin,
    sectionOrigin: fit.sectionOrigin,
  };
}

/** Root mean square distance in pixels between the clicks and the places that the fit gives them. */
export function missInPixels(fit: TwoScales, places: readonly KnownPlace[]): number {
  const [cos, sin] = [Math.cos(fit.rotation), Math.sin(fit.rotation)];
  const side = fit.mirrored ? -1 : 1;
  const squares = places.reduce((sum, { sheet, section: [offset, elevation] }) => {
    const [u, v] = [sheet[0] - fit.sheetOrigin[0], fit.sheetOrigin[1] - sheet[1]];
    const along =
      offset === null ? 0 : u * cos - v * sin - (side * (offset - fit.sectionOrigin[0])) / fit.along;
    const up = elevation === null ? 0 : u * sin + v * cos - (elevation - fit.sectionOrigin[1]) / fit.up;
    return sum + along * along + up * up;
  }, 0);
  return Math.sqrt(squares / places.length);
}
