import type { NetCells } from '#shared/compute/cells/cells.ts';
import { type CellFacts, commonRatioOf } from '#shared/compute/cells/common-ratio.ts';
import { type PartDrop, partsOfLast } from '#shared/compute/cells/last-part.ts';
import { type MissingLine, spacingOf } from '#shared/compute/cells/spacing.ts';
import { makeFinding } from '#shared/compute/findings.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { factsOf } from '#shared/compute/net-check/net-facts.ts';
import type { Finding, PointReading } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';

export type IntervalInputs = {
  readonly model: NetModel;
  readonly cells: NetCells;
  readonly heads: NetHeads;
  /** B/L as entered, and channels as stated; null = as counted. */
  readonly enteredRatio: number;
  readonly statedChannels: number | null;
  readonly accuracyPx: number;
  readonly relativeK: CellFacts['relativeK'];
};

export type IntervalQuestions = {
  readonly findings: readonly Finding[];
  /** Pairs of head lines between which one seems to be missing. */
  readonly wide: ReadonlyArray<readonly [string, string]>;
};

/** The shape of the squares and the count may differ by this part of a drop or a channel before it is asked why. */
const PART_APART = 0.2;

/**
 * Questions the count by the shape of the squares, which is the only witness to a line that was drawn and not traced when
 * the count was taken from the traces: an interval in which a line seems to be missing, and a last drop or an outermost
 * channel that looks like another part than the count makes it. What the shape says is proposed, never taken. Places in
 * working pixels.
 */
export function questionIntervals(inputs: IntervalInputs): IntervalQuestions {
  const { model, cells, heads, enteredRatio, accuracyPx } = inputs;
  const facts = factsOf(cells.cells, heads, enteredRatio, accuracyPx, inputs.relativeK);
  // Without flow lines whole strips are compared, which carry one flow only where none leaves on the way.
  const missing =
    cells.cells.length === 0 && heads.several ? [] : spacingOf(model, cells, enteredRatio, facts);
  // Cells of another ratio than the entered one are asked about by themselves, and are the measure for no part.
  const hasMeasure = commonRatioOf(cells.cells, enteredRatio, facts).agrees;
  const plain = { ...facts, dropsBetween: wholeLast(facts, model) };
  const parts = hasMeasure
    ? partsOfLast(cells.cells, enteredRatio, plain, accuracyPx)
    : { drops: [], channels: [] };
  const wide = missing
    .filter(({ kind, between }) => kind === 'equipotential' && between.length === 2)
    .map(({ between }) => [between[0]!, between[1]!] as const);
  return {
    wide,
    findings: [
      ...missing.map((line) => missingFinding(line, heads)),
      ...parts.drops
        .filter(({ before, outlet }) => !wide.some(([a, b]) => a === before && b === outlet))
        .flatMap((part) => partDropFinding(part, inputs)),
      // Where a flow line is missing, the channel without it is the measure for none.
      ...(missing.some(({ kind }) => kind === 'flowLine') ? [] : partChannelFinding(inputs, parts.channels)),
    ],
  };
}

/** Drops between two lines, the interval to an outlet taken for a whole one, so that its shape tells its part. */
function wholeLast(facts: CellFacts, model: NetModel): CellFacts['dropsBetween'] {
  const outlets = new Set(model.potentials.filter(({ role }) => role === 'outlet').map(({ id }) => id));
  return (before, after) => (outlets.has(after) ? 1 : facts.dropsBetween(before, after));
}

function missingFinding({ kind, between, factor, at }: MissingLine, heads: NetHeads): Finding {
  const times = `about ${fixedText(factor, 1)} times`;
  const details = { entityIds: between, at };
  if (kind === 'flowLine') {
    return makeFinding(
      'question',
      'flowLineMissing',
      `A channel is ${times} as wide as the others, as one is from which a flow line is missing. Trace that line, or state the count of channels.`,
      { ...details, cell: 'channels' },
    );
  }
  const [before, after] = between.map((id) => heads.byId.get(id)?.label ?? 'a line');
  return makeFinding(
    'question',
    'lineMissing',
    `Between ${before} and ${after} the cells are ${times} as long for their width as elsewhere, as they are where an equipotential is missing. Trace that line and count again, or type the heads of the two.`,
    { ...details, cell: 'drops' },
  );
}

function partDropFinding(
  { part, plusMinus, before, outlet }: PartDrop,
  { model, heads }: IntervalInputs,
): Finding[] {
  const [from, to] = [heads.byId.get(before), heads.byId.get(outlet)];
  const potential = model.potentials.find(({ id }) => id === outlet);
  const shown = `${fixedText(part, 2)} ± ${fixedText(plusMinus, 2)}`;
  const details = { cell: 'drops' as const, entityIds: [before, outlet] };
  if (potential === undefined || heads.count?.unequal) return [];
  if (from === undefined || to === undefined) {
    if (!(part + Math.max(plusMinus, PART_APART) < 1)) return [];
    const text = `By the shape of its squares the last interval, before ${potential.label}, is ${shown} of a drop. State the count with that part if the drawing bears it out.`;
    return [makeFinding('note', 'lastDropInPart', text, details)];
  }
  const counted = Math.abs(to.drops - from.drops);
  if (Math.abs(counted - part) <= Math.max(PART_APART, 2 * plusMinus) || part > 1 + PART_APART) return [];
  const text = `The count makes the last interval, from ${from.label} to ${potential.label}, ${fixedText(counted, 2)} of a drop; by the shape of its squares it is ${shown}. Check the count: it may end in a part of a drop.`;
  return [makeFinding('question', 'lastDropDiffers', text, details)];
}

function partChannelFinding(
  { statedChannels }: IntervalInputs,
  channels: ReturnType<typeof partsOfLast>['channels'],
): Finding[] {
  if (statedChannels !== null) return [];
  return channels
    .filter(({ part, plusMinus }) => part + Math.max(plusMinus, PART_APART) < 1)
    .map(({ part, plusMinus, left, right }) =>
      makeFinding(
        'question',
        'lastChannelInPart',
        `By the shape of its squares an outermost channel is ${fixedText(part, 2)} ± ${fixedText(plusMinus, 2)} of a channel, and is counted as a whole one. State the count of channels with that part if the drawing bears it out.`,
        { cell: 'channels', entityIds: [left, right].filter((id) => id !== null) },
      ),
    );
}

/**
 * A reading in a net from which a line seems to be missing, marked as in question: the count is short of a drop then, and
 * every head that follows from it is wrong, by most of a drop beside the place and by less towards the boundaries.
 */
export function markWide(point: PointReading, wide: IntervalQuestions['wide']): PointReading {
  const { between, id, sheetAt } = point;
  if (between === null || wide.length === 0) return point;
  const isBeside = wide.some((pair) => pair.includes(between.before) && pair.includes(between.after));
  const details = { cell: 'netCheck' as const, entityIds: [id], at: sheetAt };
  const found = isBeside
    ? makeFinding(
        'question',
        'lineMissingBeside',
        'Between the two lines beside the point an equipotential seems to be missing; then this and every reading beyond it is wrong. Check the lines there.',
        details,
      )
    : makeFinding(
        'question',
        'lineMissingElsewhere',
        'Elsewhere in the net an equipotential seems to be missing; then the count is wrong, and this reading with it, by up to a drop. Trace that line and count again.',
        details,
      );
  return { ...point, findings: [...point.findings, found] };
}
