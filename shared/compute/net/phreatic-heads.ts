import { makeFinding } from '#shared/compute/findings.ts';
import type { Foot } from '#shared/compute/net/feet.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import type { Equipotential, NetModel } from '#shared/compute/net/net-model.ts';
import { elevationAt } from '#shared/compute/net/potentials.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';

/** A hand-drawn net meets the phreatic line this well, in parts of a drop; a line left out or a wrong level does not. */
const ALLOWED_PART = 1 / 3;

/**
 * Questions a count or a level that the phreatic line denies: the pressure on it is nil, so that an equipotential meets
 * it at the elevation of its own head. Heads and elevations in the document's length unit; `accuracy` is the tracing
 * accuracy in it, `levelUnit` its name with the datum, for words. One finding, at the line that departs most; nothing while the count does not stand. Source:
 * Casagrande (1937), Seepage through dams.
 */
export function questionPhreaticHeads(
  model: NetModel,
  heads: NetHeads,
  map: SectionMap,
  accuracy: number,
  levelUnit: string,
): Finding[] {
  const phreatic = linesOfKind(model.lines, 'phreaticLine').map((line) => line.id);
  const allowed = Math.max(ALLOWED_PART * (heads.count?.headPerDrop ?? 0), 3 * accuracy);
  const worst = model.equipotentials
    .flatMap((line) => feetOn(line, phreatic).map((foot) => meeting(line, foot, heads, map)))
    .filter((met) => met !== null)
    .filter((met) => Math.abs(met.head - met.elevation) > allowed)
    .sort((a, b) => Math.abs(b.head - b.elevation) - Math.abs(a.head - a.elevation))[0];
  if (!worst) return [];
  return [
    makeFinding(
      'question',
      'phreaticHeadDiffers',
      `Where ${worst.label} meets the phreatic line its head is ${fixedText(worst.head, 2)} ${levelUnit}, but the elevation there is ${fixedText(worst.elevation, 2)} ${levelUnit}; on the phreatic line both are one. Check the count, the levels and whether a line was left out.`,
      { cell: 'netCheck', entityIds: [worst.id], at: worst.at },
    ),
  ];
}

function feetOn({ footed }: Equipotential, carriers: readonly string[]): Foot[] {
  return [footed.start, footed.end]
    .filter((foot) => foot !== null)
    .filter((foot) => carriers.includes(foot.carrier.id));
}

function meeting({ id }: Equipotential, foot: Foot, heads: NetHeads, map: SectionMap) {
  const line = heads.byId.get(id);
  if (line === undefined || line.head === null) return null;
  return { id, label: line.label, head: line.head, elevation: elevationAt(map, ...foot.at), at: foot.at };
}
