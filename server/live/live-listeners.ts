import type { LiveEvent } from '#shared/contract/live.ts';

type Listener = (event: LiveEvent) => void;

/** Those of this process who want to hear of changes. */
export function createListeners() {
  const listeners = new Map<Listener, () => void>();
  return {
    subscribe(listener: Listener, onGap: () => void = () => {}): () => void {
      listeners.set(listener, onGap);
      return () => {
        listeners.delete(listener);
      };
    },
    tell(event: LiveEvent): void {
      for (const listener of [...listeners.keys()]) listener(event);
    },
    tellGap(): void {
      for (const onGap of [...listeners.values()]) onGap();
    },
  };
}
