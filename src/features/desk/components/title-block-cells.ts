import { fixedText, plainText } from '#client/lib/figures.ts';
import { shortName } from '#client/lib/initials.ts';
import { titleBlockText as text } from '#client/text/title-block.ts';
import { type FlowUnit, flowIn } from '#shared/compute/quantities/seepage-volume.ts';
import { entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { NetSummary } from '#shared/contract/drawings.ts';
import type { Finding, NetReading, TitleBlockCell } from '#shared/contract/reading.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { ownFlowUnit } from '../model/flow-unit.ts';
import { figuresEntered, powerRuns } from './figure-runs.ts';
import type { Run } from './runs.tsx';

export type CellId = TitleBlockCell | 'drawn' | 'checked' | 'calculation';
export type CellState = 'ok' | 'missing' | 'wrong' | 'question';

/** One cell of the title block: what it says, how sure that is, and the sentences behind it. */
export interface TitleCell {
  id: CellId;
  label: string;
  value: readonly Run[];
  state: CellState;
  /** True when the value itself says what is the matter, so that the label need not. */
  said: boolean;
  findings: readonly Finding[];
}

/** What the title block shows besides document and reading; a frozen revision fills it from its payload. */
export interface TitleFacts {
  damName: string;
  section: { name: string; chainage: string };
  drawn: string;
  checked: string;
  /** True when the check is of an older state than the one shown. */
  checkedBefore?: boolean;
  calculation: string;
  /** Unit in which the seepage is shown; the document's own without one. */
  flowUnit?: FlowUnit | null;
}

type Told = Pick<TitleCell, 'label' | 'value'> & { state?: CellState | undefined };

/** The cells in their order on the sheet. `reading` null: not worked out yet, so no figure of it is shown. */
export function titleBlockCells(
  document: FlowNetDocument,
  reading: NetReading | null,
  facts: TitleFacts,
): TitleCell[] {
  const cell = (id: CellId, told: Told): TitleCell => {
    const findings = (reading?.findings ?? []).filter((found) => found.cell === id);
    const { label, value, state } = told;
    return { id, label, value, state: state ?? stateFrom(findings), said: state !== undefined, findings };
  };
  const { labels } = text;
  const { section } = facts;
  const head: TitleCell[] = [
    cell('section', { label: labels.section, value: [text.sectionAt(section.name, section.chainage)] }),
    cell('dam', { label: labels.dam, value: [facts.damName] }),
  ];
  const foot: TitleCell[] = [
    cell('drawn', { label: labels.drawn, value: [facts.drawn] }),
    cell('checked', {
      label: labels.checked,
      value: [facts.checked],
      state: facts.checkedBefore ? 'question' : undefined,
    }),
    cell('calculation', { label: labels.calculation, value: [facts.calculation] }),
  ];
  const told: Array<[TitleBlockCell, Told]> = [
    ['scale', scaleOf(document, reading)],
    ['residual', residualOf(document, reading)],
    ['headwater', headwaterOf(document)],
    ['outlet', outletOf(document, reading)],
    ['drops', dropsOf(document, reading)],
    ['channels', channelsOf(reading)],
    ['headPerDrop', headPerDropOf(document, reading)],
    ['permeability', permeabilityOf(document)],
    ['seepage', seepageOf(document, reading, facts.flowUnit ?? ownFlowUnit(document.unitSystem))],
    ['netCheck', netCheckOf(reading)],
  ];
  return [...head, ...told.map(([id, what]) => cell(id, what)), ...foot];
}

function stateFrom(findings: readonly Finding[]): CellState {
  for (const weight of ['wrong', 'missing', 'question'] as const) {
    if (findings.some((found) => found.weight === weight)) return weight;
  }
  return 'ok';
}

const WAITING: readonly Run[] = ['…'];
const lengthUnit = (document: FlowNetDocument) => unitNames(document.unitSystem).length;
const levelText = (document: FlowNetDocument, level: number) =>
  `${fixedText(level, DECIMALS[document.unitSystem].elevation)} ${elevationUnit(document.unitSystem, document.datum)}`;

function scaleOf(document: FlowNetDocument, reading: NetReading | null): Told {
  const label = text.labels.scale;
  if (!reading) return { label, value: WAITING };
  const { state, unitsPerPx } = reading.setOut;
  if (state === 'ambiguous') return { label, value: [text.upUnclear], state: 'missing' };
  if (unitsPerPx === null) return { label, value: [text.knownPointsNeeded], state: 'missing' };
  return { label, value: [text.perPixel(plainText(unitsPerPx, 4), lengthUnit(document))] };
}

function residualOf(document: FlowNetDocument, reading: NetReading | null): Told {
  const label = text.labels.residual;
  if (!reading) return { label, value: WAITING };
  if (reading.setOut.state !== 'fitted') return { label, value: [text.residualLater], state: 'missing' };
  const { residual } = reading.setOut;
  const doubt = placeDoubtWords(document, reading);
  if (residual === null) return { label, value: [`${text.residualNone}${doubt}`], state: 'question' };
  return { label, value: [`${fixedText(residual, 3)} ${lengthUnit(document)}${doubt}`] };
}

/** What the known points leave to a place, in the middle and at the worst corner: both coordinates in one length. */
function placeDoubtWords({ unitSystem }: FlowNetDocument, { setOut: { placeDoubt } }: NetReading): string {
  if (placeDoubt === null) return '';
  const [middle, corner] = [placeDoubt.middle, placeDoubt.corner].map(({ offset, elevation }) =>
    plainText(Math.hypot(offset, elevation), 2),
  );
  return text.placeDoubt(middle!, corner!, unitNames(unitSystem).length);
}

function headwaterOf(document: FlowNetDocument): Told {
  const label = text.labels.headwater;
  const level = singleOf(document, 'waterLevels')?.value.headwater ?? null;
  if (level === null) return { label, value: [text.levelNeeded], state: 'missing' };
  return { label, value: [levelText(document, level)] };
}

/** The outlets as they are marked on the sheet; a tailwater level with no face under it is shown all the same. */
function outletOf(document: FlowNetDocument, reading: NetReading | null): Told {
  const lines = entitiesOf(document, 'line').filter(({ value }) => value.finished);
  const outlets: Array<{ label: string; value: string }> = [];
  const tailwater = singleOf(document, 'waterLevels')?.value.tailwater ?? null;
  if (tailwater !== null) {
    outlets.push({ label: text.labels.tailwater, value: levelText(document, tailwater) });
  }
  for (const { id, value } of lines) {
    if (value.line === 'drain') {
      const level = value.head ?? reading?.lines.find((line) => line.id === id)?.head ?? null;
      const state = value.head === null ? text.drainEmpty : text.drainUnderPressure;
      const shown = level === null ? text.alongIt : state(levelText(document, level));
      outlets.push({ label: value.name || text.labels.drain, value: shown });
    }
    if (value.line === 'outflowFace') {
      outlets.push({ label: value.name || text.labels.outflowFace, value: text.ownElevation });
    }
  }
  const [only] = outlets;
  if (!only) return { label: text.labels.outlet, value: [text.outletNeeded], state: 'missing' };
  if (outlets.length === 1) return { label: only.label, value: [only.value] };
  return {
    label: text.labels.outlet,
    value: [outlets.map((each) => `${each.label} ${each.value}`).join('; ')],
  };
}

/** The count that stands; else what is stated and what is traced, as far as either is known. */
function dropsOf(document: FlowNetDocument, reading: NetReading | null): Told {
  const label = text.labels.drops;
  if (!reading) return { label, value: WAITING };
  const { drops, tracedDrops, outlets } = reading.quantities;
  if (drops !== null) return { label, value: [plainText(drops)] };
  if (outlets.length > 1) {
    const each = outlets.map((outlet) => ({
      label: outlet.label,
      drops: outlet.drops === null ? '–' : plainText(Math.round(outlet.drops * 100) / 100),
    }));
    return { label, value: [text.dropsToEach(each)] };
  }
  const stated = singleOf(document, 'netCount')?.value.drops ?? null;
  const traced = tracedDrops === null ? null : plainText(tracedDrops);
  if (stated !== null)
    return { label, value: [text.dropsStated(plainText(stated), traced)], state: 'missing' };
  return { label, value: [traced === null ? text.dropsNeeded : text.dropsTraced(traced)], state: 'missing' };
}

function channelsOf(reading: NetReading | null): Told {
  const label = text.labels.channels;
  if (!reading) return { label, value: WAITING };
  const { channels, channelsComplete } = reading.quantities;
  if (channels === null) return { label, value: [text.channelsNone], state: 'missing' };
  const value = [plainText(channels)];
  return channelsComplete
    ? { label, value }
    : { label: text.labels.tracedChannels, value, state: 'question' };
}

function headPerDropOf(document: FlowNetDocument, reading: NetReading | null): Told {
  const label = text.labels.headPerDrop;
  if (!reading) return { label, value: WAITING };
  const { headPerDrop, unequalIntervals } = reading.quantities;
  if (unequalIntervals) return { label, value: [text.unequal], state: 'question' };
  if (headPerDrop === null) return { label, value: [text.notYet], state: 'missing' };
  return { label, value: [`${fixedText(headPerDrop, 2)} ${lengthUnit(document)}`] };
}

function permeabilityOf(document: FlowNetDocument): Told {
  const label = text.labels.permeability;
  const held = singleOf(document, 'permeability')?.value;
  if (!held || held.k === null) return { label, value: [text.permeabilityNeeded], state: 'missing' };
  const factor = held.factor === null ? '' : text.within(plainText(held.factor));
  return { label, value: [...powerRuns(held.k, figuresEntered(held.k)), ` ${held.unit}${factor}`] };
}

function seepageOf(document: FlowNetDocument, reading: NetReading | null, unit: FlowUnit): Told {
  const si = document.unitSystem === 'SI';
  const label = si ? text.labels.seepagePerMetre : text.labels.seepagePerFoot;
  if (!reading) return { label, value: WAITING };
  const { seepage, seepageFigures, channels, channelsComplete, unequalIntervals } = reading.quantities;
  if (seepage !== null) {
    const only = channelsComplete ? '' : `, ${text.tracedChannelsOnly}`;
    const shown = flowIn(unit, seepage, document.unitSystem);
    const value = [...powerRuns(shown, seepageFigures), ...unitRuns(` ${unit}${only}`)];
    return { label, value, state: channelsComplete ? undefined : 'question' };
  }
  if (unequalIntervals) return { label, value: [text.unequal], state: 'question' };
  if (reading.state === 'unfinished') return { label, value: [text.notYet], state: 'missing' };
  const needed = channels === null ? text.seepageNeedsChannels : text.seepageNeeds;
  return { label, value: [needed], state: 'missing' };
}

/** Findings that say in a sentence what the check's own line says in counts. */
const SAID_BY_CHECK: readonly string[] = ['cellsNotSquare', 'anglesNotSquare', 'channelFlowsDiffer'];

/** A unit with its power raised as other powers are. */
function unitRuns(words: string): Run[] {
  const [before = '', after] = words.split('³');
  return after === undefined ? [before] : [before, { sup: '3' }, after];
}

/** What stands in the way comes first; else how the net is drawn, and how many other questions there are. */
function netCheckOf(reading: NetReading | null): Told {
  const label = text.labels.netCheck;
  if (!reading) return { label, value: WAITING };
  const open = byWeight(reading.findings).filter((found) => found.weight !== 'note');
  const [first] = open;
  const summary = reading.netCheck?.summary ?? null;
  if (summary === null || first?.weight === 'wrong' || first?.weight === 'missing') {
    if (!first) return { label, value: [text.checkNothing], state: 'ok' };
    const state = first.weight === 'note' ? 'ok' : first.weight;
    return { label, value: [text.checkMore(first.text, open.length - 1)], state };
  }
  const others = open.filter(({ code }) => !SAID_BY_CHECK.includes(code)).length;
  const isPoor = summary.cellsPoor + summary.anglesPoor + summary.channelsPoor > 0;
  return {
    label,
    value: [text.checkSummary(summary.text, others)],
    state: isPoor || others > 0 ? 'question' : 'ok',
  };
}

const WEIGHTS: readonly Finding['weight'][] = ['wrong', 'missing', 'question', 'note'];

/** Findings with the gravest first. */
export function byWeight(findings: readonly Finding[]): Finding[] {
  return [...findings].sort((a, b) => WEIGHTS.indexOf(a.weight) - WEIGHTS.indexOf(b.weight));
}

/** What the cell "Checked" says of a net: a check of what was changed since is no check of what is shown. */
export function checkedText(net: Pick<NetSummary, 'state' | 'reviewer' | 'changedSinceRevision'>): string {
  const { checkedBy } = text;
  if (net.state === 'draft') return checkedBy.draft;
  const told = checkedBy[net.state](shortName(net.reviewer?.name ?? ''));
  return net.changedSinceRevision ? checkedBy.changedSince(told) : told;
}
