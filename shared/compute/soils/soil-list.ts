import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { composed, inverted, type LinearMap } from '#shared/compute/linear-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { ratioOf } from '#shared/compute/soils/anisotropy.ts';
import { permeabilityPerSecond } from '#shared/compute/units.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';

/** A symmetric 2 × 2 tensor. */
export type Tensor = { readonly xx: number; readonly xy: number; readonly yy: number };

/** A soil with what lets water through it; `kh`, `kv` in length units per second, null until entered. */
export type Soil = {
  /** Id of its entity; null for the soil of a section whose permeability has no entity yet. */
  readonly id: string | null;
  /** Words for it inside a sentence. */
  readonly label: string;
  readonly kh: number | null;
  readonly kv: number | null;
  readonly dipDeg: number;
  /** Places inside its regions, in the frame of the document that was read; none for the soil of the section. */
  readonly places: readonly Pair[];
  readonly value: EntityOf<'permeability'> | EntityOf<'soil'>;
};

/** The soil of all regions that no other claims, and the soils that claim regions. */
export type SoilList = { readonly section: Soil; readonly placed: readonly Soil[] };

/**
 * The soils of a document. `permeability`: what is entered for the section; `impliedRatio`: kh/kv of a section drawn
 * transformed, by which a kv that is left open follows from kh; null elsewhere, where it equals kh.
 */
export function soilsOf(
  document: FlowNetDocument,
  permeability: EntityOf<'permeability'>,
  impliedRatio: number | null,
): SoilList {
  const soil = (id: string | null, label: string, value: Soil['value'], places: readonly Pair[]): Soil => {
    const kh =
      value.k === null ? null : usable(permeabilityPerSecond(value.k, value.unit, document.unitSystem));
    const kv = kh === null ? null : usable(kh / ratioOf(value, impliedRatio));
    return { id, label, kh, kv, dipDeg: value.dipDeg, places, value };
  };
  return {
    section: soil(
      singleOf(document, 'permeability')?.id ?? null,
      'the soil of the section',
      permeability,
      [],
    ),
    placed: entitiesOf(document, 'soil')
      .filter(({ value }) => value.places.length > 0)
      .map(({ id, value }) => soil(id, value.name.trim() || 'a soil without a name', value, value.places)),
  };
}

/** A figure that can be reckoned with; null for one that rounding has made 0 or endless. */
function usable(k: number): number | null {
  return k > 0 && Number.isFinite(k) ? k : null;
}

/**
 * Permeability of the isotropic soil that a transformed section stands for, √(kh·kv), in length units per second; null
 * while a figure is missing. Source: Samsioe (1931); Casagrande (1937); Harr (1962), ch. 1.
 */
export function equivalentK({ kh, kv }: Soil): number | null {
  return kh === null || kv === null ? null : Math.sqrt(kh) * Math.sqrt(kv);
}

/**
 * Permeability tensor of a soil in pixels of a frame, M·K·Mᵀ with K = kh·e·eᵀ + kv·n·nᵀ in the section, e along the
 * bedding, n across it, and M from section to pixels: of use up to a factor that all soils share, since ∇·(K∇h) = 0
 * keeps its form in any linear frame (Bear 1972, sec. 5.6). Null while a figure is missing.
 */
export function tensorIn(soil: Soil, map: SectionMap): Tensor | null {
  const { kh, kv } = soil;
  if (kh === null || kv === null) return null;
  const dip = (soil.dipDeg * Math.PI) / 180;
  const [cos, sin] = [Math.cos(dip), Math.sin(dip)];
  const natural: LinearMap = [
    kh * cos * cos + kv * sin * sin,
    (kv - kh) * cos * sin,
    (kv - kh) * cos * sin,
    kh * sin * sin + kv * cos * cos,
  ];
  const [a, b, c, d] = inverted(map.linear);
  const size = map.unitsPerPx;
  const toPx: LinearMap = [a * size, b * size, c * size, d * size];
  const transposed: LinearMap = [toPx[0], toPx[2], toPx[1], toPx[3]];
  const [xx, xy, , yy] = composed(composed(toPx, natural), transposed);
  return { xx, xy, yy };
}

/**
 * Width of a cell across the flow over its length along it that a soil must show when the cells of the counted soil show
 * `cellRatio`: as much water passes both, k·(B/L) is one along a channel, so that B/L = cellRatio·k_counted/k. k is
 * √(kh·kv) of each, and the cells are measured in the common transformed section. Null while a permeability is missing.
 * Source: Casagrande (1937), section on composite sections.
 */
export function expectedCellRatio(soil: Soil, counted: Soil, cellRatio: number): number | null {
  const [k, kc] = [equivalentK(soil), equivalentK(counted)];
  if (k === null || kc === null) return null;
  const ratio = (cellRatio * kc) / k;
  return ratio > 0 && Number.isFinite(ratio) ? ratio : null;
}
