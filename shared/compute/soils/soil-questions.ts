import { makeFinding } from '#shared/compute/findings.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { questionSoils } from '#shared/compute/net/soil-boundaries.ts';
import { isPlausible, ratioOf } from '#shared/compute/soils/anisotropy.ts';
import type { InterfaceCrossing } from '#shared/compute/soils/interface-crossings.ts';
import type { Soil, SoilList } from '#shared/compute/soils/soil-list.ts';
import type { WorkingFrame } from '#shared/compute/working-frame.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText, plainText } from '#shared/text/number-text.ts';

/** Lengths along the bedding by what is typed and by what is drawn may differ by this part. */
const IMPLIED_PART = 0.05;
/** A line that departs by less than this from the refraction law is drawn as well as a hand draws, degrees. */
const LEAST_DEPARTURE_DEG = 10;

const idsOf = (...soils: readonly Soil[]) => soils.flatMap(({ id }) => (id === null ? [] : [id]));

/**
 * Questions about permeabilities along and across the bedding, soil by soil: one without the other, a ratio that no soil
 * has, kv above kh, and what denies the ratio for which the section is drawn transformed.
 */
export function questionSoilList({ section, placed }: SoilList, impliedRatio: number | null): Finding[] {
  const soils = [section, ...placed];
  return [
    ...soils.flatMap(questionRatio),
    ...(impliedRatio === null ? [] : questionImplied(soils, impliedRatio)),
  ];
}

function questionRatio(soil: Soil): Finding[] {
  const { k, kv } = soil.value;
  if (kv === null) return [];
  const about = { cell: 'permeability', entityIds: idsOf(soil) } as const;
  if (k === null) {
    const text = `For ${soil.label} kv is entered and kh is not. Enter kh: without it kv counts for nothing.`;
    return [makeFinding('question', 'horizontalKMissing', text, about)];
  }
  const ratio = ratioOf(soil.value, null);
  if (!isPlausible(ratio)) {
    const text = `For ${soil.label} kh and kv differ by more than ten thousand times. Check both figures and their unit.`;
    return [makeFinding('wrong', 'anisotropyImplausible', text, about)];
  }
  if (!(ratio < 1)) return [];
  const text = `For ${soil.label} kv is greater than kh. Soils are more permeable along their bedding: check that the two have not been exchanged.`;
  return [makeFinding('question', 'verticalKGreater', text, about)];
}

function questionImplied(soils: readonly Soil[], implied: number): Finding[] {
  const cell = { cell: 'permeability' } as const;
  if (!isPlausible(implied)) {
    const text =
      'The two scales of the transformed section imply a ratio of kh to kv that no soil has. Check the known points.';
    return [makeFinding('wrong', 'anisotropyImplausible', text, { cell: 'scale' })];
  }
  const figure = plainText(implied, 3);
  const denied = soils.filter(
    ({ value }) =>
      value.k !== null &&
      value.kv !== null &&
      Math.abs(Math.sqrt(ratioOf(value, null) / implied) - 1) > IMPLIED_PART,
  );
  const dipping = soils.filter(({ dipDeg }) => dipDeg !== 0);
  return [
    ...denied.map((soil) =>
      makeFinding(
        'wrong',
        'anisotropyContradicts',
        `The scales of the transformed section imply kh/kv = ${figure}, the permeabilities entered for ${soil.label} make ${plainText(ratioOf(soil.value, null), 3)}. Correct the permeabilities or the known points, or declare the scales as plotting exaggeration.`,
        { ...cell, entityIds: idsOf(soil) },
      ),
    ),
    ...dipping.map((soil) =>
      makeFinding(
        'wrong',
        'dipInTransformed',
        `A section with two scales is transformed along the level, but the bedding of ${soil.label} is said to dip. Take the dip away, or declare the scales as plotting exaggeration.`,
        { ...cell, entityIds: idsOf(soil) },
      ),
    ),
    makeFinding(
      'note',
      'impliedAnisotropy',
      `The section is drawn transformed: its scales imply kh/kv = ${figure}. The permeability entered counts as kh, and the seepage as √(kh·kv).`,
      cell,
    ),
  ];
}

type UsedSoils = {
  readonly list: SoilList;
  /** Soils that lie within the net. */
  readonly used: readonly Soil[];
  readonly counted: Soil | null;
  readonly countedIn: string | null;
  readonly frame: WorkingFrame;
  readonly model: NetModel;
  readonly crossings: readonly InterfaceCrossing[];
};

/** Questions about the soils that lie within the net, and about the lines that pass from one to another. */
export function questionUsedSoils({
  list,
  used,
  counted,
  countedIn,
  frame,
  model,
  crossings,
}: UsedSoils): Finding[] {
  if (list.placed.length === 0) return questionSoils(model);
  const absent = list.placed.filter((soil) => !used.includes(soil));
  const unknown = used.filter(({ kh }) => kh === null);
  return [
    ...(model.strips.length === 0 ? [] : absent.map(outsideNet)),
    ...(used.length > 1 ? unknown.map(permeabilityNeeded) : []),
    ...(used.length > 0 && (counted === null || !used.includes(counted))
      ? [countedElsewhere(countedIn)]
      : []),
    ...(frame.kind === 'none' ? [noCommonTransform()] : []),
    ...refractionFindings(crossings),
  ];
}

function outsideNet(soil: Soil): Finding {
  return makeFinding(
    'question',
    'soilOutsideNet',
    `No part of the net lies in the regions of ${soil.label}. Check where its places lie.`,
    { cell: 'permeability', entityIds: idsOf(soil), at: soil.places[0] ?? null },
  );
}

function permeabilityNeeded(soil: Soil): Finding {
  return makeFinding(
    'missing',
    'soilPermeabilityMissing',
    `Enter the permeability of ${soil.label}: between soils the heads depend on how they compare.`,
    { cell: 'permeability', entityIds: idsOf(soil), at: soil.places[0] ?? null },
  );
}

function countedElsewhere(countedIn: string | null): Finding {
  const text =
    countedIn === null
      ? 'The net lies in soils of their own, and it is not said in which of them the channels are counted. Say so: the seepage is counted with its permeability.'
      : 'The soil in which the channels are said to be counted has no part in the net. Say in which soil they are counted.';
  return makeFinding('question', 'countedSoilUnknown', text, { cell: 'channels' });
}

function noCommonTransform(): Finding {
  return makeFinding(
    'note',
    'noCommonTransform',
    'The soils differ in kh/kv or in dip and share no transformed section: the net is shown and read in the natural one, and its cells are not judged as squares. B/L is that of the cells in the transformed section of the soil in which they are counted.',
    { cell: 'netCheck' },
  );
}

/** One finding for each soil boundary, at its worst crossing. */
function refractionFindings(crossings: readonly InterfaceCrossing[]): Finding[] {
  const poor = crossings.filter(
    ({ departureDeg, toleranceDeg }) => departureDeg > Math.max(LEAST_DEPARTURE_DEG, toleranceDeg),
  );
  return [...new Set(poor.map(({ boundaryId }) => boundaryId))].map((boundaryId) => {
    const there = poor.filter((each) => each.boundaryId === boundaryId);
    const worst = there.reduce((most, each) => (each.departureDeg > most.departureDeg ? each : most));
    const others = there.length === 1 ? '' : ` (the worst of ${there.length} lines)`;
    return makeFinding(
      'question',
      'refractionOff',
      `Where a line passes from ${worst.from.label} to ${worst.to.label} its direction departs by ${fixedText(worst.departureDeg, 0)}° from tan α₁/tan α₂ = k₁/k₂${others}. Check how the lines bend at the boundary, and the permeabilities.`,
      { cell: 'netCheck', entityIds: [boundaryId, ...there.map(({ lineId }) => lineId)], at: worst.at },
    );
  });
}
