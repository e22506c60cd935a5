import type { SectionFit } from '#shared/compute/section-map.ts';
import { type ControlPair, centroidOf } from '#shared/compute/similarity.ts';

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

/** Sums over control pairs about their centroids. */
type Moments = {
  readonly sheetOrigin: readonly [number, number];
  readonly sectionOrigin: readonly [number, number];
  /** Σu·X, Σv·X, Σu·Z, Σv·Z. */
  readonly uX: number;
  readonly vX: number;
  readonly uZ: number;
  readonly vZ: number;
  /** ΣX², ΣZ², Σ(u² + v²). */
  readonly XX: number;
  readonly ZZ: number;
  readonly ww: number;
};

/** Least part of the spread of the points by which they must tell one turn from another. */
const TURN_TOLD = 0.1;

/**
 * Least-squares fit of two scales, in pixels: Σ|w − (p·X·e₁(θ) + q·Z·e₂(θ))|² is least, w = (u, v) being the clicks and
 * e₁ = (cos θ, −sin θ), e₂ = (sin θ, cos θ). For a given θ, p = Σ(w·e₁)X/ΣX² and q = Σ(w·e₂)Z/ΣZ²; what is then left to
 * be made greatest is a quadratic form in (cos θ, sin θ), so that θ is its principal axis. `rotation`: θ where it is
 * known, null to fit it. Pixels and section units. Null when offsets or elevations do not differ, or when the points lie
 * so nearly on one line that they tell no turn. Own derivation, an orthogonal affine fit.
 */
export function fitTwoScales(pairs: readonly ControlPair[], rotation: number | null): TwoScales | null {
  const sums = momentsOf(pairs);
  if (!(sums.XX > 0) || !(sums.ZZ > 0) || !(sums.ww > 0)) return null;
  const turn = rotation ?? principalTurn(sums);
  if (turn === null) return null;
  const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
  const p = (sums.uX * cos - sums.vX * sin) / sums.XX;
  const q = (sums.uZ * sin + sums.vZ * cos) / sums.ZZ;
  if (p === 0 || q === 0) return null;
  // Half a turn more changes the sign of both: up is where elevations grow.
  const flipped = q < 0;
  return {
    along: 1 / Math.abs(p),
    up: 1 / Math.abs(q),
    rotation: flipped ? Math.atan2(-sin, -cos) : Math.atan2(sin, cos),
    mirrored: flipped ? p > 0 : p < 0,
    sheetOrigin: sums.sheetOrigin,
    sectionOrigin: sums.sectionOrigin,
  };
}

/** θ that fits best; null where the points hardly tell it. */
function principalTurn({ uX, vX, uZ, vZ, XX, ZZ, ww }: Moments): number | null {
  const cc = (uX * uX) / XX + (vZ * vZ) / ZZ;
  const ss = (vX * vX) / XX + (uZ * uZ) / ZZ;
  const cs = (uZ * vZ) / ZZ - (uX * vX) / XX;
  const told = Math.hypot(cc - ss, 2 * cs);
  if (!(Math.sqrt(told / ww) >= TURN_TOLD)) return null;
  return Math.atan2(2 * cs, cc - ss) / 2;
}

function momentsOf(pairs: readonly ControlPair[]): Moments {
  const sheetOrigin = centroidOf(pairs.map((pair) => pair.sheet));
  const sectionOrigin = centroidOf(pairs.map((pair) => pair.section));
  const sums = { uX: 0, vX: 0, uZ: 0, vZ: 0, XX: 0, ZZ: 0, ww: 0 };
  for (const { sheet, section } of pairs) {
    const [u, v] = [sheet[0] - sheetOrigin[0], sheetOrigin[1] - sheet[1]];
    const [X, Z] = [section[0] - sectionOrigin[0], section[1] - sectionOrigin[1]];
    sums.uX += u * X;
    sums.vX += v * X;
    sums.uZ += u * Z;
    sums.vZ += v * Z;
    sums.XX += X * X;
    sums.ZZ += Z * Z;
    sums.ww += u * u + v * v;
  }
  return { ...sums, sheetOrigin, sectionOrigin };
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
export function missInPixels(fit: TwoScales, pairs: readonly ControlPair[]): number {
  const [cos, sin] = [Math.cos(fit.rotation), Math.sin(fit.rotation)];
  const squares = pairs.map(({ sheet, section }) => {
    const along = ((fit.mirrored ? -1 : 1) * (section[0] - fit.sectionOrigin[0])) / fit.along;
    const up = (section[1] - fit.sectionOrigin[1]) / fit.up;
    const du = along * cos + up * sin - (sheet[0] - fit.sheetOrigin[0]);
    const dv = up * cos - along * sin - (fit.sheetOrigin[1] - sheet[1]);
    return du * du + dv * dv;
  });
  return Math.sqrt(squares.reduce((sum, each) => sum + each, 0) / pairs.length);
}
