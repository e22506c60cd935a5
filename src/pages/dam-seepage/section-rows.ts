import type { ChosenNet, DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import { chainageIn } from '#shared/text/chainage.ts';

/** A section of the table, with the net that stands for it. */
export interface SectionRow {
  id: string;
  name: string;
  chainage: string;
  /** Null for a section that was put away since its net was chosen. */
  drawing: { id: string; title: string } | null;
  nets: ReadonlyArray<{ id: string; name: string; putAway: boolean }>;
  /** The net chosen, and what it says as soon as it is read. */
  netId: string | null;
  chosen: ChosenNet | null;
}

/**
 * The sections by chainage, those without one last, with the nets that the address names. What was put away since it
 * was chosen keeps its row, so that nothing drops out unseen.
 */
export function sectionRows(found: DamSeepageDto, netIds: readonly string[]): SectionRow[] {
  const chosen = found.chosen.filter(({ netId }) => netIds.includes(netId));
  const inUse = found.sections.map((section): SectionRow => {
    const own = chosen.find(({ sectionId }) => sectionId === section.id) ?? null;
    const nets = section.nets.map((net) => ({ ...net, putAway: false }));
    const isOffered = own === null || nets.some(({ id }) => id === own.netId);
    return {
      ...section,
      nets: isOffered ? nets : [...nets, putAwayNet(own)],
      netId: own?.netId ?? nets.find(({ id }) => netIds.includes(id))?.id ?? null,
      chosen: own,
    };
  });
  const others = chosen
    .filter(({ sectionId }) => !found.sections.some(({ id }) => id === sectionId))
    .map((own) => ({
      id: own.sectionId,
      name: own.sectionName,
      chainage: own.chainage,
      drawing: null,
      nets: [putAwayNet(own)],
      netId: own.netId,
      chosen: own,
    }));
  const at = ({ chainage }: SectionRow) => chainageIn(chainage, found.unitSystem) ?? Number.MAX_VALUE;
  return [...inUse, ...others].sort((a, b) => at(a) - at(b));
}

const putAwayNet = ({ netId, netName }: ChosenNet) => ({ id: netId, name: netName, putAway: true });

/** The nets that the address is to name when another one, or none, stands for the section of `row`. */
export function withNet(netIds: readonly string[], row: SectionRow, netId: string | null): string[] {
  const others = netIds.filter((each) => each !== row.netId && !row.nets.some(({ id }) => id === each));
  return netId === null ? others : [...others, netId];
}
