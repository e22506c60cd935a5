import type { UnitSystem } from '#shared/contract/document.ts';

/** Names of the units in which a document's values are shown. */
export type UnitNames = {
  readonly length: string;
  readonly pressure: string;
  readonly unitWeight: string;
  /** Seepage per run of dam; the figure 3 of the volume is raised by its own character, as in print. */
  readonly seepage: string;
};

const NAMES: Record<UnitSystem, UnitNames> = {
  SI: { length: 'm', pressure: 'kPa', unitWeight: 'kN/m³', seepage: 'm³/s per m' },
  US: { length: 'ft', pressure: 'lb/ft²', unitWeight: 'lb/ft³', seepage: 'ft³/s per ft' },
};

/** Unit names of a unit system: m, kPa and kN/m³, or ft, lb/ft² (psf) and lb/ft³. */
export function unitNames(system: UnitSystem): UnitNames {
  return NAMES[system];
}

/** Length unit with the datum's name for the head of an elevation column: "m LD"; the bare unit without a name. */
export function elevationUnit(system: UnitSystem, datum: string): string {
  const name = datum.trim();
  return name === '' ? NAMES[system].length : `${NAMES[system].length} ${name}`;
}

/** Decimals with which the schedule shows each quantity: about the size that a reading can mean. */
export const DECIMALS = {
  SI: { offset: 1, elevation: 2, drops: 2, head: 2, pressureHead: 2, pressure: 1 },
  US: { offset: 1, elevation: 2, drops: 2, head: 2, pressureHead: 2, pressure: 0 },
} as const satisfies Record<UnitSystem, Record<string, number>>;
