/** Whether this tab may write the net: one tab for each person and net in a browser. */
export type WriterState = 'asking' | 'writer' | 'elsewhere';

export interface WriterLock {
  /** Asks the tab that writes to hand over. */
  takeOver(): void;
  close(): void;
}

const HAND_OVER_MS = 2000;

/** Web Locks exist on secure addresses only (https, or this machine). */
export const hasWriterLocks = (): boolean => 'locks' in navigator;

/**
 * Waits for the right to write and says how it stands. A tab that is asked to hand over calls `handOver` first, so
 * that what it holds is on the disk before the other one reads it. A tab that does not answer (frozen in the
 * background) is passed over after two seconds.
 */
export function openWriterLock(
  owner: string,
  on: { state(state: WriterState): void; handOver(): Promise<void> },
): WriterLock {
  const name = `tracehead-writer/${owner}`;
  const channel = new BroadcastChannel(name);
  let release: (() => void) | null = null;
  let waiting = new AbortController();
  let closed = false;

  const hold = () =>
    new Promise<void>((resolve) => {
      release = resolve;
      on.state('writer');
    });
  /** The lock was taken away by a tab that got no answer; a wait given up on purpose is no loss. */
  const lost = () => {
    if (!release || closed) return;
    release = null;
    on.state('elsewhere');
    wait();
  };
  function wait() {
    waiting = new AbortController();
    navigator.locks.request(name, { signal: waiting.signal }, hold).catch(lost);
  }

  channel.onmessage = async () => {
    if (!release) return;
    const letGo = release;
    release = null;
    on.state('elsewhere');
    await on.handOver();
    letGo();
    if (!closed) wait();
  };

  on.state('asking');
  wait();
  // Requests are granted in order, so a lock that is held when this answer comes is held by another tab.
  void navigator.locks.query().then(({ held }) => {
    if (!closed && !release && held?.some((lock) => lock.name === name)) on.state('elsewhere');
  });

  return {
    takeOver() {
      channel.postMessage('hand over');
      setTimeout(() => {
        if (release || closed) return;
        // Own waiting request must go first, or it would take the lock again after the next hand-over.
        waiting.abort();
        navigator.locks.request(name, { steal: true }, hold).catch(lost);
      }, HAND_OVER_MS);
    },
    close() {
      closed = true;
      waiting.abort();
      channel.close();
      release?.();
    },
  };
}
