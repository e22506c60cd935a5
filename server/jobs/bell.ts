/** Wakes whoever waits; a ring that nobody waited for ends the next wait at once. */
export interface Bell {
  ring(): void;
  /** Resolves with the next ring, after `ms`, or when the signal aborts. */
  heard(ms: number, signal: AbortSignal): Promise<void>;
}

export function createBell(): Bell {
  const waiting = new Set<() => void>();
  let rung = false;
  return {
    ring() {
      rung = waiting.size === 0;
      for (const wake of waiting) wake();
    },
    heard(ms, signal) {
      if (rung || signal.aborted) {
        rung = false;
        return Promise.resolve();
      }
      return new Promise((resolve) => {
        const wake = () => {
          clearTimeout(timer);
          waiting.delete(wake);
          signal.removeEventListener('abort', wake);
          resolve();
        };
        const timer = setTimeout(wake, ms);
        waiting.add(wake);
        signal.addEventListener('abort', wake, { once: true });
      });
    },
  };
}
