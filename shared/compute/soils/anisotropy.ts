import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';

/** The part of a soil that says how it lets water through. */
export type Permeable = Pick<EntityOf<'permeability'>, 'k' | 'kv' | 'dipDeg' | 'unit'>;

/** kh/kv and dip that all the soils of a section share; `none` when they do not share one. */
export type CommonAnisotropy = {
  readonly kind: 'natural' | 'transformed' | 'none';
  /** kh/kv, along the bedding over across it; 1 unless transformed. */
  readonly ratio: number;
  /** Dip of the bedding in degrees, positive where it falls towards growing offsets; 0 unless transformed. */
  readonly dipDeg: number;
};

/** Ratios typed to two figures and meant to be one differ by less than this part. */
const SAME_RATIO = 0.01;
/** No natural deposit or fill is layered beyond this; a ratio above it, or below its inverse, is a slip of a unit. */
export const GREATEST_RATIO = 1e4;
/** Dips in degrees that differ by less are one. */
const SAME_DIP = 0.1;

/** An isotropic section. */
export const NATURAL: CommonAnisotropy = { kind: 'natural', ratio: 1, dipDeg: 0 };
const NONE: CommonAnisotropy = { kind: 'none', ratio: 1, dipDeg: 0 };

/**
 * kh/kv of a soil as typed; where kv is left open, `implied` by a section that is drawn transformed, or else 1. A soil
 * whose kh is open has no ratio of its own.
 */
export function ratioOf({ k, kv }: Permeable, implied: number | null): number {
  if (k === null || kv === null) return implied ?? 1;
  return k / kv;
}

/**
 * The one anisotropy of several soils. Their transformed sections coincide when kh/kv and dip are one for all (Samsioe
 * 1931; Casagrande 1937, Seepage through dams, section on anisotropic soils); dips mean nothing where kh = kv. No soil
 * counts as isotropic. Where the section is drawn transformed, `implied` is the kh/kv for which it was drawn, along a
 * level bedding, and holds whatever is typed: the drawing is not transformed again.
 */
export function commonAnisotropy(soils: readonly Permeable[], implied: number | null): CommonAnisotropy {
  if (implied !== null)
    return isPlausible(implied) ? { kind: 'transformed', ratio: implied, dipDeg: 0 } : NONE;
  const each = soils.map((soil) => ({ ratio: ratioOf(soil, null), dipDeg: soil.dipDeg }));
  const [first] = each;
  if (first === undefined) return NATURAL;
  if (each.every(({ ratio }) => isOne(ratio))) return NATURAL;
  if (!each.every(({ ratio }) => isPlausible(ratio))) return NONE;
  const shared = each.every(
    ({ ratio, dipDeg }) => Math.abs(ratio / first.ratio - 1) <= SAME_RATIO && sameDip(dipDeg, first.dipDeg),
  );
  return shared ? { kind: 'transformed', ...first } : NONE;
}

/** True for a ratio by which a section may be transformed. */
export function isPlausible(ratio: number): boolean {
  return ratio <= GREATEST_RATIO && ratio >= 1 / GREATEST_RATIO;
}

function isOne(ratio: number): boolean {
  return Math.abs(ratio - 1) <= 1e-9;
}

/** Bedding that stands upright dips by 90° to either side. */
function sameDip(a: number, b: number): boolean {
  const apart = Math.abs(a - b);
  return Math.min(apart, 180 - apart) <= SAME_DIP;
}

/**
 * The one anisotropy of the soils of a document: of all that are placed somewhere, and of the section's unless its
 * permeability is left open beside them. `implied` as in `commonAnisotropy`.
 */
export function anisotropyOf(
  document: FlowNetDocument,
  permeability: EntityOf<'permeability'>,
  implied: number | null,
): CommonAnisotropy {
  const placed = entitiesOf(document, 'soil')
    .filter(({ value }) => value.places.length > 0)
    .map(({ value }) => value);
  const section = permeability.k === null && placed.length > 0 ? [] : [permeability];
  return commonAnisotropy([...section, ...placed], implied);
}
