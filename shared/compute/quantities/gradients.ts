import type { EntityOf } from '#shared/contract/document.ts';

/** What is entered of a soil's weight. */
export type SoilWeight = Pick<
  EntityOf<'permeability'>,
  'saturatedUnitWeight' | 'moistUnitWeight' | 'specificGravity' | 'voidRatio'
>;

/**
 * Saturated unit weight γsat = γw·(Gs + e)/(1 + e) of a soil of grain specific gravity Gs and void ratio e, in the unit
 * of γw. Source: phase relations, as in Terzaghi and Peck (1948).
 */
export function saturatedFrom(specificGravity: number, voidRatio: number, gammaW: number): number {
  return (gammaW * (specificGravity + voidRatio)) / (1 + voidRatio);
}

/**
 * Saturated unit weight of a soil, kN/m³ or lb/ft³ as γw: as entered, otherwise from Gs and e; null while neither is
 * known.
 */
export function saturatedUnitWeight(soil: SoilWeight, gammaW: number): number | null {
  if (soil.saturatedUnitWeight !== null) return soil.saturatedUnitWeight;
  if (soil.specificGravity === null || soil.voidRatio === null) return null;
  return finiteOrNull(saturatedFrom(soil.specificGravity, soil.voidRatio, gammaW));
}

/**
 * Critical gradient i_c = γ'/γw with γ' = γsat − γw; from Gs and e it is (Gs − 1)/(1 + e). Null while the weight is not
 * known, and for a soil that is no heavier than water, of which no factor may be made. Source: Terzaghi (1922).
 */
export function criticalGradient(soil: SoilWeight, gammaW: number): number | null {
  const saturated = saturatedUnitWeight(soil, gammaW);
  if (saturated === null) return null;
  const critical = finiteOrNull((saturated - gammaW) / gammaW);
  return critical !== null && critical > 0 ? critical : null;
}

/**
 * Factor of safety against boiling, F = i_c/i, for upward flow through level ground; null for any other flow, i ≤ 0.
 * Source: Terzaghi (1922); Harr (1962).
 */
export function factorAgainstBoiling(critical: number, upwardGradient: number): number | null {
  return upwardGradient > 0 ? finiteOrNull(critical / upwardGradient) : null;
}

/**
 * Seepage force per volume of soil, j = i·γw in the direction of the flow, kN/m³ or lb/ft³ as γw. Source: Terzaghi
 * (1943).
 */
export function seepageForce(gradient: number, gammaW: number): number {
  return gradient * gammaW;
}

/**
 * Pore pressure ratio r_u = u/(γ·z): pore pressure over the weight of the soil above, σ = Σγ·Δz, both in one unit of
 * pressure. Null where nothing lies above. Source: Bishop and Morgenstern (1960).
 */
export function pressureRatio(porePressure: number, overburden: number): number | null {
  return overburden > 0 ? finiteOrNull(porePressure / overburden) : null;
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
