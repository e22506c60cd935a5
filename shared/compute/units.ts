import type { PermeabilityUnit, UnitSystem } from '#shared/contract/document.ts';

/** Metres in one international foot, exact by definition (NIST SP 811, App. B). */
export const METRES_PER_FOOT = 0.3048;
const SECONDS_PER_DAY = 86_400;
/** A year in permeability units is 365.25 days, the usual meaning of ft/year. */
const SECONDS_PER_YEAR = 365.25 * SECONDS_PER_DAY;

/** Newtons in one pound-force: 0.45359237 kg × 9.80665 m/s², exact by definition (NIST SP 811, App. B). */
export const NEWTONS_PER_POUND_FORCE = 0.45359237 * 9.80665;

const METRES_PER_SECOND: Record<PermeabilityUnit, number> = {
  'm/s': 1,
  'cm/s': 0.01,
  'm/day': 1 / SECONDS_PER_DAY,
  'ft/s': METRES_PER_FOOT,
  'ft/min': METRES_PER_FOOT / 60,
  'ft/day': METRES_PER_FOOT / SECONDS_PER_DAY,
  'ft/year': METRES_PER_FOOT / SECONDS_PER_YEAR,
};

/** Metres in the length unit of a unit system: 1 for SI, 0.3048 (the international foot) for US customary. */
export function metresPerLengthUnit(system: UnitSystem): number {
  return system === 'SI' ? 1 : METRES_PER_FOOT;
}

/** Permeability in m/s of a value entered in any unit on offer. */
export function permeabilityInMetresPerSecond(k: number, unit: PermeabilityUnit): number {
  return k * METRES_PER_SECOND[unit];
}

/** Permeability in the length unit of a system per second: m/s for SI, ft/s for US customary. */
export function permeabilityPerSecond(k: number, unit: PermeabilityUnit, system: UnitSystem): number {
  return permeabilityInMetresPerSecond(k, unit) / metresPerLengthUnit(system);
}

/** kPa in one lb/ft² (psf), exact by definition. */
export const KILOPASCALS_PER_PSF = NEWTONS_PER_POUND_FORCE / METRES_PER_FOOT ** 2 / 1000;

/** kN/m³ in one lb/ft³, exact by definition; 62.4 lb/ft³ is 9.802 kN/m³, not 9.81. */
export const KN_PER_M3_PER_PCF = NEWTONS_PER_POUND_FORCE / METRES_PER_FOOT ** 3 / 1000;
