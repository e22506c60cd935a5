import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import { type Applied, entityValue, type LocalOp } from './document-ops.ts';
import { sameValue } from './same-value.ts';

/** One step that can be taken back: the ops that do so, and what each entity looked like right after the step. */
export type HistoryStep = {
  readonly label: string;
  readonly inverse: readonly LocalOp[];
  readonly after: ReadonlyMap<string, DocumentEntity | null>;
};

/** Steps done and steps taken back, newest last. */
export type History = { readonly done: readonly HistoryStep[]; readonly undone: readonly HistoryStep[] };

export const EMPTY_HISTORY: History = { done: [], undone: [] };

/** The step that a change just applied makes. */
export function stepOf(label: string, applied: Applied): HistoryStep {
  const after = new Map<string, DocumentEntity | null>();
  for (const { entityId } of applied.ops) after.set(entityId, entityValue(applied.document, entityId));
  return { label, inverse: applied.inverse, after };
}

/** History after a new step; what had been taken back can then no longer be done again. */
export function withStep(history: History, step: HistoryStep): History {
  return { done: [...history.done, step], undone: [] };
}

/** True when nobody has changed the step's entities since, so that taking it back undoes nobody else's work. */
export function isUntouched(step: HistoryStep, document: FlowNetDocument): boolean {
  for (const [entityId, value] of step.after) {
    if (!sameValue(entityValue(document, entityId), value)) return false;
  }
  return true;
}

/** Labels of the next step back and the next step forward; null when there is none. */
export function historyLabels(history: History): { undoLabel: string | null; redoLabel: string | null } {
  return {
    undoLabel: history.done.at(-1)?.label ?? null,
    redoLabel: history.undone.at(-1)?.label ?? null,
  };
}
