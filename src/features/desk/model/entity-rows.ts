import type { FlowNetDocument, SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import type { DeskState } from './desk-state.ts';
import { LINE_KINDS } from './sheet-kinds.ts';

export type LineState = 'finished' | 'unfinished' | 'hidden' | 'locked' | 'guessed' | 'adopted';

export type LineRow = {
  readonly id: string;
  readonly line: TracedLine;
  /** Its number among the lines of its kind, by which one without a name is called. */
  readonly number: number;
  readonly states: readonly LineState[];
  /** As counted by its order; null where there is no count, and where it is typed. */
  readonly drops: number | null;
  readonly head: number | null;
  readonly findings: readonly Finding[];
  readonly locked: boolean;
};

type Of = Pick<DeskState, 'document' | 'reading' | 'hiddenKinds' | 'lockedKinds'>;

/** All lines by kind, and of one kind by the drops lost to them, else as they were made. */
export function lineRows({ document, reading, hiddenKinds, lockedKinds }: Of): LineRow[] {
  const read = new Map((reading?.lines ?? []).map((line) => [line.id, line]));
  const findings = findingsById(reading);
  const lines = entitiesOf(document, 'line');
  return LINE_KINDS.flatMap((kind) =>
    lines
      .filter(({ value }) => value.line === kind)
      .map(({ id, value }) => ({ id, value, drops: read.get(id)?.drops ?? null }))
      .sort((a, b) => (a.drops ?? Infinity) - (b.drops ?? Infinity) || (a.id < b.id ? -1 : 1))
      .map(({ id, value, drops }, index): LineRow => {
        const locked = lockedKinds.includes(kind);
        return {
          id,
          line: value,
          number: index + 1,
          states: statesOf(value, hiddenKinds.includes(kind), locked),
          drops,
          head: read.get(id)?.head ?? null,
          findings: findings.get(id) ?? [],
          locked,
        };
      }),
  );
}

function statesOf(line: TracedLine, hidden: boolean, locked: boolean): LineState[] {
  const states: LineState[] = [line.finished ? 'finished' : 'unfinished'];
  if (hidden) states.push('hidden');
  if (locked) states.push('locked');
  if (line.origin !== 'traced') states.push(line.origin);
  return states;
}

/** What was found about each thing. */
export function findingsById(reading: NetReading | null): Map<string, Finding[]> {
  const found = new Map<string, Finding[]>();
  for (const finding of reading?.findings ?? [])
    for (const id of finding.entityIds) found.set(id, [...(found.get(id) ?? []), finding]);
  return found;
}

/** The place of a thing that is brought into view for it; null where it has none on the sheet. */
export function placeToShow(
  document: FlowNetDocument,
  reading: NetReading | null,
  id: string,
): SheetPoint | null {
  const value = document.entities[id]?.value;
  if (value?.kind === 'line') return value.points[Math.floor(value.points.length / 2)] ?? null;
  if (value?.kind === 'knownPoint') return value.at;
  return reading?.points.find((point) => point.id === id)?.sheetAt ?? null;
}
