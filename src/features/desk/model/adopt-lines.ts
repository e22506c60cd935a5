import { adoptionText as text } from '#client/text/adoption.ts';
import type { Adoptable, AdoptableKind } from '#shared/compute/beside/adopted-lines.ts';
import { entitiesOf, type FlowNetDocument, type TracedLine } from '#shared/contract/document.ts';
import type { DeskStore, RunResult } from './desk-state.ts';
import type { LocalOp } from './document-ops.ts';
import { sameValue } from './same-value.ts';

/** Adopts lines of the computed net as one step; with `replaced`, in place of the traced ones of that kind. */
export function adoptLines(
  store: DeskStore,
  lines: readonly Adoptable[],
  replaced: AdoptableKind | null = null,
): RunResult {
  const { document } = store.getState();
  const removed = replaced === null ? [] : traced(document, replaced);
  const kept = new Set(removed.map(({ id }) => id));
  const there = entitiesOf(document, 'line').filter(({ id }) => !kept.has(id));
  const values = lines
    .flatMap(({ pieces }) => pieces)
    .filter((piece) => !there.some(({ value }) => isSameLine(value, piece)));
  const ops: LocalOp[] = [
    ...removed.map(({ id }): LocalOp => ({ op: 'remove', entityId: id })),
    ...values.map((value): LocalOp => ({ op: 'put', entityId: store.newId(), value })),
  ];
  const [first] = lines;
  return first === undefined || ops.length === 0
    ? { ok: true }
    : store.run(text.adopted(first.kind, lines.length, replaced !== null), ops);
}

/** True when every piece of a computed line is in the document already. */
export function isAdopted(document: FlowNetDocument, { pieces }: Adoptable): boolean {
  const lines = entitiesOf(document, 'line');
  return pieces.every((piece) => lines.some(({ value }) => isSameLine(value, piece)));
}

/** Lines of a kind that were not adopted: traced by hand or guessed. */
export function traced(document: FlowNetDocument, kind: AdoptableKind) {
  return entitiesOf(document, 'line').filter(
    ({ value }) => value.line === kind && value.origin !== 'adopted',
  );
}

function isSameLine(a: TracedLine, b: TracedLine): boolean {
  return a.line === b.line && a.origin === 'adopted' && sameValue(a.points, b.points);
}

/** The computed line that a guide over the sheet shows; null for another guide. Ids are those of `computedNetGuides`. */
export function adoptableOfGuide(lines: readonly Adoptable[], guideId: string): Adoptable | null {
  const [name, index] = guideId.split(' ');
  const kind = name === 'surface' ? 'phreaticLine' : name;
  return lines.find((line) => line.kind === kind && line.index === Number(index)) ?? null;
}

/**
 * True when a solution of one document is one of another too: equipotentials, flow lines and what is read do not enter
 * it. `usesPhreaticLine`: the traced phreatic line was taken as its upper boundary.
 */
export function isSolvedAlike(a: FlowNetDocument, b: FlowNetDocument, usesPhreaticLine: boolean): boolean {
  const enters = ({ value }: FlowNetDocument['entities'][string]) => {
    if (value.kind !== 'line') return value.kind !== 'readingPoint' && value.kind !== 'profile';
    if (value.line === 'phreaticLine') return usesPhreaticLine;
    return value.line !== 'equipotential' && value.line !== 'flowLine';
  };
  const [before, after] = [a, b].map(({ entities }) => Object.values(entities).filter(enters));
  return (
    before!.length === after!.length && before!.every(({ id, value }) => b.entities[id]?.value === value)
  );
}
