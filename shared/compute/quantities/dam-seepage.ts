import { type Reach, seepageAlong } from '#shared/compute/quantities/average-end.ts';
import { seepagePerMetre } from '#shared/compute/quantities/seepage-volume.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { chainageIn } from '#shared/text/chainage.ts';

/** A section of a dam with what its net says of the seepage. */
export type DamSection = {
  readonly id: string;
  readonly chainage: string;
  /** Unit system of its net, m³/s per m or ft³/s per ft; the chainage is in the dam's. */
  readonly unitSystem: UnitSystem;
  /** Null where the net is unfinished or gives no seepage. */
  readonly seepage: number | null;
};

export type LeftOutSection = { readonly id: string; readonly code: string; readonly text: string };

/** Seepage along a dam in metres and m³/s, and the sections that are no part of it. */
export type DamSeepage = {
  readonly reaches: readonly Reach[];
  readonly length: number | null;
  readonly flow: number | null;
  readonly leftOut: readonly LeftOutSection[];
};

/**
 * Seepage along a dam from the nets of several sections, by the average-end rule between their chainages. Sections
 * without a readable chainage or without a seepage are left out and named, and so are all that share one chainage: which
 * of them holds is the engineer's to say. Length and flow are null while fewer than two remain. Metres and m³/s,
 * whatever the unit systems of the dam and of its nets. Source: as for `seepageAlong`.
 */
export function damSeepage(sections: readonly DamSection[], damSystem: UnitSystem): DamSeepage {
  const metres = metresPerLengthUnit(damSystem);
  const placed = sections.map((section) => ({ section, at: chainageIn(section.chainage, damSystem) }));
  const leftOut: LeftOutSection[] = [];
  const taken: Array<{ chainage: number; seepage: number }> = [];
  for (const { section, at } of placed) {
    const reason = reasonAgainst(section, at, placed);
    if (reason !== null) leftOut.push({ id: section.id, ...reason });
    else if (at !== null && section.seepage !== null)
      taken.push({ chainage: at * metres, seepage: seepagePerMetre(section.seepage, section.unitSystem) });
  }
  const along = seepageAlong(taken);
  return {
    reaches: along?.reaches ?? [],
    length: along?.length ?? null,
    flow: along?.flow ?? null,
    leftOut,
  };
}

function reasonAgainst(
  section: DamSection,
  at: number | null,
  placed: ReadonlyArray<{ section: DamSection; at: number | null }>,
): Omit<LeftOutSection, 'id'> | null {
  if (at === null) {
    const text = 'Its chainage is no number. Give it as a length along the dam.';
    return { code: 'chainageUnreadable', text };
  }
  if (section.seepage === null) {
    const text = 'Its net gives no seepage. Finish the net and enter the permeability.';
    return { code: 'noSeepage', text };
  }
  const shared = placed.some(
    (other) => other.section !== section && other.at === at && other.section.seepage !== null,
  );
  if (!shared) return null;
  const text = 'Another section with a seepage lies at the same chainage. Say which of them holds.';
  return { code: 'chainageTwice', text };
}
