import { makeFinding } from '#shared/compute/findings.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Finding, LineReading } from '#shared/contract/reading.ts';

/** One line of the sequence from headwater to outlet with its count and head. */
export type CountedLine = {
  readonly id: string;
  readonly drops: number;
  readonly head: number;
  readonly source: LineReading['source'];
};

export type DropCount = {
  /** Empty when the count does not stand. */
  readonly lines: readonly CountedLine[];
  /** Drops that the traced lines make, to propose the count. */
  readonly tracedDrops: number | null;
  /** Head of one drop, H/Nd; it belongs to the whole net only when `unequal` is false. */
  readonly headPerDrop: number | null;
  readonly unequal: boolean;
  readonly findings: readonly Finding[];
};

/** A count is taken for whole, and two counts for the same, within this part of a drop. */
const SAME_DROP = 0.05;

/**
 * Numbers the equipotentials of one flow from headwater to outlet by drops lost and gives each its head.
 *
 * `sequence`: finished equipotentials in the order of the flow; `headwater`, `outHead`: heads at the ends, document
 * length unit; `stated`: the count of drops stated by the engineer, null when none is. n lines make n + 1 drops unless
 * typed drops or heads say otherwise; a typed value holds, and the untyped lines between two of them are counted and
 * have to fit. Where typed heads part the loss unequally, drops are counted line by line and the heads are the typed
 * ones. A count that does not stand returns no lines and the findings that say why.
 */
export function countDrops(
  sequence: readonly NetLine[],
  headwater: number,
  outHead: number,
  stated: number | null,
): DropCount {
  const lost = headwater - outHead;
  const tracedDrops = proposedDrops(sequence, headwater, lost, stated);
  const nothing = { lines: [], tracedDrops, headPerDrop: null, unequal: false };
  if (!(lost > 0)) return { ...nothing, findings: [noLoss()] };
  if (stated === null) return { ...nothing, findings: [notStated(tracedDrops)] };
  const headPerDrop = lost / stated;
  if (!Number.isFinite(headPerDrop) || !(headPerDrop > 0)) return { ...nothing, findings: [outOfBounds()] };
  const marks = marksOf(sequence, headwater, headPerDrop, stated);
  const ends: WayEnds = {
    headwater,
    headPerDrop,
    from: 0,
    to: stated,
    fromLabel: 'the headwater',
    toLabel: 'the outlet',
  };
  const wrongs = disorder(sequence, marks, ends);
  if (wrongs.length > 0) return { ...nothing, findings: wrongs };
  const typedHeadsFit = marks.every((mark) => mark.source !== 'typedHead' || isNearWhole(mark.drops ?? 0));
  const counted = fillBetween(sequence, marks, ends);
  if ('findings' in counted) return { ...nothing, findings: counted.findings };
  if (!typedHeadsFit && !stepsFit(stated, sequence.length, true)) {
    return { ...nothing, findings: [doesNotFit(sequence, -1, sequence.length, stated, ends)] };
  }
  const lines = sequence.map((line, i): CountedLine => {
    const drops = counted.drops[i]!;
    const mark = marks[i]!;
    const head = mark.source === 'typedHead' ? line.value.head! : headwater - drops * headPerDrop;
    return { id: line.id, drops: typedHeadsFit ? drops : i + 1, head, source: mark.source };
  });
  const unequal = !typedHeadsFit || unequalSteps(counted.drops, stated);
  return { lines, tracedDrops, headPerDrop, unequal, findings: [] };
}

/** The ends of one way of the water, in drops lost and in words, and what a drop is worth. */
export type WayEnds = {
  readonly headwater: number;
  readonly headPerDrop: number;
  readonly from: number;
  readonly to: number;
  readonly fromLabel: string;
  readonly toLabel: string;
};

/**
 * Counts the lines of a further way of the water, in the order of the flow, between lines that are `known` already, by
 * the head per drop of the net. The way may begin and end at part drops. Returns the lines that were not known, or the
 * findings that say where the count does not come out.
 */
export function countBetween(
  sequence: readonly NetLine[],
  known: ReadonlyMap<string, CountedLine>,
  ends: WayEnds,
): { lines: CountedLine[]; findings: readonly Finding[] } {
  const typed = marksOf(sequence, ends.headwater, ends.headPerDrop, ends.to);
  const marks = typed.map((mark, i): Mark => {
    const line = known.get(sequence[i]!.id);
    return line === undefined ? mark : { drops: line.drops, source: line.source };
  });
  const wrongs = disorder(sequence, marks, ends);
  if (wrongs.length > 0) return { lines: [], findings: wrongs };
  const counted = fillBetween(sequence, marks, ends);
  if ('findings' in counted) return { lines: [], findings: counted.findings };
  const lines = sequence.map(({ id, value }, i): CountedLine => {
    const { source } = marks[i]!;
    const drops = counted.drops[i]!;
    const head = source === 'typedHead' ? value.head! : ends.headwater - drops * ends.headPerDrop;
    return { id, drops, head, source };
  });
  return { lines: lines.filter(({ id }) => !known.has(id)), findings: [] };
}

type Mark = { drops: number | null; source: LineReading['source'] };

function marksOf(
  sequence: readonly NetLine[],
  headwater: number,
  headPerDrop: number,
  stated: number,
): Mark[] {
  return sequence.map(({ value }): Mark => {
    if (value.head !== null) {
      const drops = (headwater - value.head) / headPerDrop;
      const whole = Math.round(drops);
      // A printed head is rounded: within a twentieth of a drop it means the whole count.
      return { drops: isNearWhole(drops) && whole < stated ? whole : drops, source: 'typedHead' };
    }
    if (value.drops !== null) return { drops: value.drops, source: 'typedDrops' };
    return { drops: null, source: 'counted' };
  });
}

function isNearWhole(drops: number): boolean {
  return Math.abs(drops - Math.round(drops)) <= SAME_DROP;
}

/** Typed values must fall along the flow, and lie between headwater and outlet. */
function disorder(sequence: readonly NetLine[], marks: readonly Mark[], ends: WayEnds): Finding[] {
  const findings: Finding[] = [];
  let before = ends.from;
  sequence.forEach((line, i) => {
    const drops = marks[i]!.drops;
    if (drops === null) return;
    if (!(drops > before) || !(drops < ends.to)) {
      findings.push(
        makeFinding(
          'wrong',
          'typedOutOfOrder',
          `The value typed at ${nameOf(line, i)} does not fit its place in the flow: heads must fall from ${ends.fromLabel} to ${ends.toLabel}. Correct the value or the line.`,
          { cell: 'drops', entityIds: [line.id], at: line.value.points[0] ?? null },
        ),
      );
    }
    before = Math.max(before, drops);
  });
  return findings;
}

/** Counts the untyped lines between known places; they have to come out even. */
function fillBetween(
  sequence: readonly NetLine[],
  marks: readonly Mark[],
  ends: WayEnds,
): { drops: number[] } | { findings: Finding[] } {
  const drops: number[] = [];
  // The first step of a way that begins within a drop is what is left of that drop.
  let known = Math.floor(ends.from + SAME_DROP);
  let knownAt = -1;
  for (let i = 0; i <= sequence.length; i += 1) {
    const isOutlet = i === sequence.length;
    const here = isOutlet ? ends.to : marks[i]!.drops;
    if (here === null) continue;
    const between = i - knownAt - 1;
    const steps = here - known;
    if ((between > 0 || sequence.length === 0) && !stepsFit(steps, between, isOutlet)) {
      return { findings: [doesNotFit(sequence, knownAt, i, steps, ends)] };
    }
    for (let k = 1; k <= between; k += 1) drops.push(known + k);
    if (!isOutlet) drops.push(here);
    known = here;
    knownAt = i;
  }
  return { drops };
}

/** Lines between two known places make one step more than there are; the last step to the outlet may be a part drop. */
function stepsFit(steps: number, between: number, toOutlet: boolean): boolean {
  if (Math.abs(steps - (between + 1)) <= SAME_DROP) return true;
  return toOutlet && Math.ceil(steps - SAME_DROP) === between + 1;
}

function unequalSteps(drops: readonly number[], stated: number): boolean {
  const steps = drops.map((value, i) => value - (drops[i - 1] ?? 0));
  // The last step is left out: a part drop at the outlet still leaves one head per drop.
  const last = stated - (drops[drops.length - 1] ?? 0);
  return steps.some((step) => Math.abs(step - 1) > SAME_DROP) || last > 1 + SAME_DROP;
}

function proposedDrops(
  sequence: readonly NetLine[],
  headwater: number,
  lost: number,
  stated: number | null,
): number | null {
  let drops = 0;
  for (const { value } of sequence) {
    if (value.drops !== null) drops = value.drops;
    else if (value.head !== null && stated !== null && lost > 0)
      drops = ((headwater - value.head) / lost) * stated;
    else drops += 1;
  }
  const proposed = Math.round((drops + 1) * 1000) / 1000;
  const partial = stated !== null && Math.ceil(stated - SAME_DROP) === proposed ? stated : proposed;
  return Number.isFinite(partial) && partial > 0 ? partial : null;
}

function nameOf(line: NetLine | undefined, i: number): string {
  const name = line?.value.name.trim() ?? '';
  return name === '' ? `line ${i + 1}` : name;
}

function noLoss(): Finding {
  return makeFinding(
    'wrong',
    'noHeadLost',
    'No head is lost from the headwater to the outlet: the outlet lies as high as the headwater or higher. Check both levels.',
    { cell: 'headwater' },
  );
}

function outOfBounds(): Finding {
  return makeFinding(
    'wrong',
    'countOutOfBounds',
    'The head per drop cannot be worked out from these levels and this count. Check both.',
    { cell: 'drops' },
  );
}

function notStated(tracedDrops: number | null): Finding {
  const proposal = tracedDrops === null ? '' : ` The traced lines make ${tracedDrops}.`;
  return makeFinding(
    'missing',
    'dropsNotStated',
    `State the number of drops counted on the drawing.${proposal}`,
    {
      cell: 'drops',
    },
  );
}

function doesNotFit(
  sequence: readonly NetLine[],
  from: number,
  to: number,
  steps: number,
  ends: WayEnds,
): Finding {
  const start = from === -1 ? ends.fromLabel : nameOf(sequence[from], from);
  const end = to === sequence.length ? ends.toLabel : nameOf(sequence[to], to);
  const ids = [sequence[from]?.id, sequence[to]?.id].filter((id) => id !== undefined);
  return makeFinding(
    'missing',
    'countDisagrees',
    `Between ${start} and ${end} the traced lines make ${to - from} drops, the count stated or typed there makes ${Math.round(steps * 1000) / 1000}. Trace the missing lines, take away the surplus ones, or correct the count.`,
    { cell: 'drops', entityIds: ids },
  );
}
