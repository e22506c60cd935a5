import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { netQuery } from '../api/net-queries.ts';
import { type DeskSession, openToRead, openToWrite, reasonAgainstWriting } from '../saving/desk-session.ts';
import { queueOwner } from '../saving/queue-storage.ts';
import { hasWriterLocks, openWriterLock, type WriterLock } from '../saving/writer-lock.ts';

export interface OpenDesk {
  session: DeskSession | null;
  /** Why it could not be opened; null while it is being opened or is open. */
  error: unknown;
  takeOver: () => void;
}

/**
 * Opens a net for one person: to write in the one tab that may, to read elsewhere. Becoming the writer loads the net
 * afresh, since the other tab may have changed it.
 */
export function useDeskSession(netId: string, personId: string): OpenDesk {
  const queryClient = useQueryClient();
  const [session, setSession] = useState<DeskSession | null>(null);
  const [error, setError] = useState<unknown>(null);
  const lock = useRef<WriterLock | null>(null);

  useEffect(() => {
    let ended = false;
    let current: DeskSession | null = null;
    const load = () => queryClient.fetchQuery(netQuery(netId));

    // One after the other: a tab may become the writer while it is still being opened to read.
    let turn: Promise<void> = Promise.resolve();
    function show(open: (detail: NetDetailDto) => DeskSession | Promise<DeskSession>): Promise<void> {
      turn = turn.then(() => replace(open)).catch((failure) => (ended ? undefined : setError(failure)));
      return turn;
    }
    async function replace(open: (detail: NetDetailDto) => DeskSession | Promise<DeskSession>) {
      if (ended) return;
      const opened = await open(await load());
      if (ended) return opened.close();
      await current?.close();
      current = opened;
      setSession(opened);
    }
    async function start() {
      const reason = reasonAgainstWriting(await load());
      if (ended) return;
      if (reason) return show((detail) => openToRead(detail, reason));
      if (!hasWriterLocks()) return show((detail) => openToWrite(detail, personId, false));
      lock.current = openWriterLock(queueOwner(personId, netId), {
        state: (state) => {
          // At once: what is changed after the last of the queue is on the disk would be lost.
          if (state === 'elsewhere') current?.store.setReadOnly(true);
          if (state === 'writer') void show((detail) => openToWrite(detail, personId, true));
          if (state === 'elsewhere') void show((detail) => openToRead(detail, 'elsewhere'));
        },
        handOver: async () => current?.handOver(),
      });
    }

    start().catch((failure) => ended || setError(failure));
    return () => {
      ended = true;
      const held = lock.current;
      lock.current = null;
      // The right to write goes last: whoever has it next reads the queue as this visit leaves it.
      void Promise.resolve(current?.leave()).finally(() => held?.close());
      setSession(null);
      setError(null);
    };
  }, [netId, personId, queryClient]);

  return { session, error, takeOver: () => lock.current?.takeOver() };
}
