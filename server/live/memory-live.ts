import { afterCommit } from '#server/entities/after-commit.ts';
import type { LiveEvent } from '#shared/contract/live.ts';
import { createListeners } from './live-listeners.ts';
import type { LivePort } from './live-port.ts';

export interface MemoryLive extends LivePort {
  /** What was announced and committed, in order. */
  published: LiveEvent[];
  /** As if the channel had been down for a while. */
  breakOff(): void;
}

/** Announcements within one process, for tests that need no database to carry them. */
export function createMemoryLive(): MemoryLive {
  const { subscribe, tell, tellGap } = createListeners();
  const published: LiveEvent[] = [];
  return {
    published,
    breakOff: tellGap,
    subscribe,
    async publish(manager, event) {
      afterCommit(manager, () => {
        published.push(event);
        tell(event);
      });
    },
    async start() {},
    async stop() {},
  };
}
