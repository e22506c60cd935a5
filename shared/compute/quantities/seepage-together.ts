import { damSeepage } from '#shared/compute/quantities/dam-seepage.ts';
import { seepageCautions } from '#shared/compute/quantities/seepage-cautions.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { ChosenNet, DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import type { UnitSystem } from '#shared/contract/unit-system.ts';
import { chainageIn } from '#shared/text/chainage.ts';

/** A net as it was read for its section: levels in metres, seepage in m³/s per metre. */
export type ReadNet = Omit<ChosenNet, 'chainageMetres' | 'leftOut'> & { readonly putAway: boolean };

const PUT_AWAY = { code: 'putAway', text: 'This net or its section has been put away. Choose another.' };

/**
 * The seepage over a length of dam from one net for each section, with its doubt and its cautions: `damSeepage` of the
 * nets that are in use. The nets come back by chainage, those without one last. Metres and m³/s; chainages are read in
 * the dam's unit system. Source: as for `damSeepage` and `commonFactor`.
 */
export function seepageTogether(
  nets: readonly ReadNet[],
  damSystem: UnitSystem,
): Pick<DamSeepageDto, 'chosen' | 'reaches' | 'total' | 'cautions'> {
  const along = damSeepage(
    nets.map(({ netId, chainage, seepage, putAway }) => ({
      id: netId,
      chainage,
      unitSystem: 'SI',
      seepage: putAway ? null : seepage,
    })),
    damSystem,
  );
  const chosen = nets
    .map(({ putAway, ...net }): ChosenNet => {
      const left = along.leftOut.find(({ id }) => id === net.netId);
      const reason = left ? { code: left.code, text: left.text } : null;
      return {
        ...net,
        chainageMetres: metresOf(net.chainage, damSystem),
        leftOut: putAway ? PUT_AWAY : reason,
      };
    })
    .sort(byChainage);
  const counted = chosen.filter(({ leftOut }) => leftOut === null);
  const { length, flow } = along;
  const doubt = { factor: commonFactor(counted), figures: commonFigures(counted) };
  return {
    chosen,
    reaches: [...along.reaches],
    total: length === null || flow === null ? null : { length, flow, ...doubt },
    cautions: seepageCautions(chosen, damSystem),
  };
}

/**
 * The factor (×/÷) within which a sum of seepages is known when what makes them doubtful, the permeability above all, is
 * common to all sections: the greatest of theirs, as Σ wᵢ·qᵢ with every qᵢ within ×/÷ fᵢ lies within ×/÷ max fᵢ, whatever
 * the weights. It says nothing about the ground between the sections. Null where a section has no factor, and for no
 * sections. Source: JCGM 100 (2008), 5.2.2, fully correlated inputs.
 */
export function commonFactor(sections: ReadonlyArray<Pick<ChosenNet, 'factor'>>): number | null {
  let greatest: number | null = null;
  for (const { factor } of sections) {
    if (factor === null) return null;
    greatest = Math.max(greatest ?? factor, factor);
  }
  return greatest;
}

/** Significant figures that a sum of seepages deserves: the fewest of its sections'; 1 for no sections. */
export function commonFigures(sections: ReadonlyArray<Pick<ChosenNet, 'figures'>>): number {
  return sections.length === 0 ? 1 : Math.min(...sections.map(({ figures }) => figures));
}

function metresOf(chainage: string, damSystem: UnitSystem): number | null {
  const at = chainageIn(chainage, damSystem);
  return at === null ? null : at * metresPerLengthUnit(damSystem);
}

function byChainage(a: ChosenNet, b: ChosenNet): number {
  return (a.chainageMetres ?? Number.MAX_VALUE) - (b.chainageMetres ?? Number.MAX_VALUE);
}
