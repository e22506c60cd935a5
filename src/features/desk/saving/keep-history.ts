import { createStore, type StoreApi } from 'zustand/vanilla';
import type { DeskStore } from '../model/desk-state.ts';
import type { History } from '../model/history.ts';
import { type HistoryStorage, openHistoryStorage } from './history-storage.ts';
import { EMPTY_KEPT, historyOf, type KeptHistory, keptAs, LARGEST_HISTORY } from './kept-history.ts';

/** How far the steps that can be taken back are kept for later visits. */
export interface HistoryFacts {
  /** False where this browser keeps none of them. */
  kept: boolean;
  /** Oldest steps that a later visit will not have. */
  dropped: number;
}

export interface HistoryKeeping {
  facts: StoreApi<HistoryFacts>;
  /** Ends keeping, after the newest steps are written. */
  stop(): Promise<void>;
}

export interface KeptSteps {
  storage: HistoryStorage | null;
  kept: KeptHistory;
  history: History;
}

/** The steps that earlier visits left; none where the browser keeps nothing. */
export async function loadSteps(owner: string, mayKeep: boolean): Promise<KeptSteps> {
  const none = { storage: null, kept: EMPTY_KEPT, history: historyOf(EMPTY_KEPT) };
  if (!mayKeep) return none;
  try {
    const storage = await openHistoryStorage();
    const kept = (await storage.load(owner)) ?? EMPTY_KEPT;
    return { storage, kept, history: historyOf(kept) };
  } catch {
    return none;
  }
}

/**
 * Keeps the steps of an open desk. Apart from the unsent work, and one step may be missing after a sudden end: each
 * step holds what it left behind, so that one which no longer fits is refused and never applied to something else.
 */
export function keepHistory(
  desk: DeskStore,
  owner: string,
  { storage, kept: loaded }: KeptSteps,
  now: () => number,
  largest = LARGEST_HISTORY,
): HistoryKeeping {
  let kept = loaded;
  let written = desk.getState().steps;
  let writing: Promise<void> = Promise.resolve();
  const facts = createStore<HistoryFacts>(() => ({ kept: storage !== null, dropped: loaded.dropped }));

  async function write(): Promise<void> {
    const { steps } = desk.getState();
    if (storage === null || steps === written) return;
    const next = keptAs(kept, steps, loaded.dropped, largest);
    try {
      await storage.save(owner, kept, next, now());
      kept = next;
      written = steps;
      facts.setState({ kept: true, dropped: next.dropped });
    } catch {
      // A full disk: the steps of this visit stay at hand, and the list says that they are not kept.
      facts.setState({ kept: false });
    }
  }

  const end = desk.subscribe((state, before) => {
    if (state.steps !== before.steps) writing = writing.then(write);
  });
  return {
    facts,
    async stop() {
      end();
      await writing;
    },
  };
}
