import type { EntityManager } from 'typeorm';
import type { LiveEvent } from '#shared/contract/live.ts';

/** Tells every open browser, on whichever server process, that something changed. Carries ids only. */
export interface LivePort {
  /** Announces in the transaction of the change: nobody hears of it unless the change is committed. */
  publish(manager: EntityManager, event: LiveEvent): Promise<void>;
  /**
   * Calls `listener` for every announced event until the returned function is called. `onGap` is called when
   * events may have been missed, because the channel was down for a while: whoever listens has to look again.
   */
  subscribe(listener: (event: LiveEvent) => void, onGap?: () => void): () => void;
  start(): Promise<void>;
  stop(): Promise<void>;
}
