import { METRES_PER_FOOT } from '#shared/compute/units.ts';
import type { UnitSystem } from '#shared/contract/document.ts';

const SECONDS_PER_DAY = 86_400;
/** Cubic metres in one US liquid gallon, 231 cubic inches, exact by definition (NIST SP 811, App. B). */
const CUBIC_METRES_PER_GALLON = 231 * 0.0254 ** 3;

/** Units in which a seepage over a length of dam is given. */
export type FlowUnit = 'm³/s' | 'L/s' | 'm³/day' | 'gal/day' | 'ft³/s';

const CUBIC_METRES_PER_SECOND: Record<FlowUnit, number> = {
  'm³/s': 1,
  'L/s': 1e-3,
  'm³/day': 1 / SECONDS_PER_DAY,
  'gal/day': CUBIC_METRES_PER_GALLON / SECONDS_PER_DAY,
  'ft³/s': METRES_PER_FOOT ** 3,
};

/** Units on offer, in the order in which they are shown. */
export const FLOW_UNITS = Object.keys(CUBIC_METRES_PER_SECOND) as FlowUnit[];

/**
 * A flow in another unit. `flow` in m³/s for SI, in ft³/s for US customary; gallons are US liquid gallons of 231 cubic
 * inches. Source: exact definitions, NIST SP 811 (2008), App. B.
 */
export function flowIn(unit: FlowUnit, flow: number, system: UnitSystem): number {
  const cubicMetres = flow * CUBIC_METRES_PER_SECOND[system === 'SI' ? 'm³/s' : 'ft³/s'];
  return cubicMetres / CUBIC_METRES_PER_SECOND[unit];
}

/**
 * Seepage per run of dam in m³/s per m, from m³/s per m (SI) or ft³/s per ft (US): a foot squared is 0.3048² m². Source:
 * exact definition of the international foot, NIST SP 811 (2008), App. B.
 */
export function seepagePerMetre(seepage: number, system: UnitSystem): number {
  return system === 'SI' ? seepage : seepage * METRES_PER_FOOT ** 2;
}
