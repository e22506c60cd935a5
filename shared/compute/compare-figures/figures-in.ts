import { KILOPASCALS_PER_PSF, KN_PER_M3_PER_PCF, METRES_PER_FOOT } from '#shared/compute/units.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { FigureGroup, Quantity } from './figure-types.ts';

/** What one US customary unit of a quantity is in SI: ft in m, lb/ft² in kPa, lb/ft³ in kN/m³, ft²/s in m²/s, lb/ft in kN/m. */
const SI_PER_US: Record<Quantity, number> = {
  offset: METRES_PER_FOOT,
  elevation: METRES_PER_FOOT,
  totalHead: METRES_PER_FOOT,
  length: METRES_PER_FOOT,
  scale: METRES_PER_FOOT,
  permeability: METRES_PER_FOOT,
  seepage: METRES_PER_FOOT ** 2,
  pressure: KILOPASCALS_PER_PSF,
  unitWeight: KN_PER_M3_PER_PCF,
  force: KILOPASCALS_PER_PSF * METRES_PER_FOOT,
  drops: 1,
  count: 1,
  ratio: 1,
  factor: 1,
};

/**
 * The same figures in another unit system, ± included. Source: exact definitions of the international foot and the
 * pound-force, NIST SP 811 (2008), App. B.
 */
export function figuresIn(to: UnitSystem, from: UnitSystem, groups: readonly FigureGroup[]): FigureGroup[] {
  if (from === to) return [...groups];
  return groups.map((group) => ({
    ...group,
    figures: group.figures.map((figure) => {
      const ratio = to === 'SI' ? SI_PER_US[figure.quantity] : 1 / SI_PER_US[figure.quantity];
      const converted = (value: number | null) => (value === null ? null : value * ratio);
      return { ...figure, value: converted(figure.value), plusMinus: converted(figure.plusMinus) };
    }),
  }));
}
