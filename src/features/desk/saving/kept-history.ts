import type { History, HistoryStep } from '../model/history.ts';

/** A step under a number of its own, by which the browser keeps it. */
export interface KeptStep {
  id: number;
  step: HistoryStep;
}

/** The part of a history that is kept for later visits. */
export interface KeptHistory {
  nextId: number;
  /** Oldest steps that were left out, because the rest fills what one history may fill. */
  dropped: number;
  done: KeptStep[];
  undone: KeptStep[];
}

/**
 * Characters that the steps of one net may fill: some three thousand steps on lines of a hundred points. They are all
 * in memory again after a reload, at several bytes for each character.
 */
export const LARGEST_HISTORY = 8_000_000;

export const EMPTY_KEPT: KeptHistory = { nextId: 1, dropped: 0, done: [], undone: [] };

/** The steps as the desk goes on with them. */
export function historyOf(kept: KeptHistory): History {
  return { done: kept.done.map(({ step }) => step), undone: kept.undone.map(({ step }) => step) };
}

/**
 * What is to be kept of a history now. Steps that are kept already stay under their numbers; where there are too many
 * the oldest are left out. `droppedBefore`: how many were left out already when this visit began.
 */
export function keptAs(
  before: KeptHistory,
  history: History,
  droppedBefore: number,
  largest = LARGEST_HISTORY,
): KeptHistory {
  const known = new Map([...before.done, ...before.undone].map((kept) => [kept.step, kept]));
  let { nextId } = before;
  const numbered = (step: HistoryStep): KeptStep => {
    const held = known.get(step);
    if (held) return held;
    nextId += 1;
    return { id: nextId - 1, step };
  };
  const undone = newest(history.undone, largest);
  const done = newest(history.done, largest - totalSize(undone));
  return {
    undone: undone.map(numbered),
    done: done.map(numbered),
    nextId,
    dropped: droppedBefore + history.done.length - done.length,
  };
}

function newest(steps: readonly HistoryStep[], largest: number): readonly HistoryStep[] {
  let first = steps.length;
  let size = 0;
  while (first > 0) {
    size += sizeOf(steps[first - 1]!);
    if (size > largest) break;
    first -= 1;
  }
  return steps.slice(first);
}

const totalSize = (steps: readonly HistoryStep[]) => steps.reduce((sum, step) => sum + sizeOf(step), 0);

const sizes = new WeakMap<HistoryStep, number>();

/** Characters of a step as text, which is worked out once. */
function sizeOf(step: HistoryStep): number {
  let size = sizes.get(step);
  if (size === undefined) {
    size = JSON.stringify([step.label, step.inverse, [...step.after]]).length;
    sizes.set(step, size);
  }
  return size;
}
