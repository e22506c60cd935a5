import type { EntityManager } from 'typeorm';
import type { LiveEvent } from '#shared/contract/live.ts';

/** Tells every open browser, on whichever server process, that something changed. Carries ids only. */
export interface LivePort {
  /** Announces in the transaction of the change: nobody hears of it unless the change is committed. */
  publish(manager: EntityManager, event: LiveEvent): Promise<void>;
  /** Calls `listener` for every announced event until the returned function is called. */
  subscribe(listener: (event: LiveEvent) => void): () => void;
  start(): Promise<void>;
  stop(): Promise<void>;
}
