import { useEffect, useState } from 'react';
import { v7 as newUuid } from 'uuid';
import { presenceApi } from '#client/features/desk/api/presence-api.ts';
import type { DeskSession } from '#client/features/desk/saving/desk-session.ts';
import { type Presence, startPresence } from '#client/features/desk/saving/presence.ts';
import { useLive } from '#client/lib/use-live.ts';

/** Somebody who touches nothing for so long is not at the desk, and their sign-in is not kept up by it. */
const IDLE_MS = 10 * 60_000;
const LOOK_MS = 30_000;
const SIGNS = ['pointermove', 'pointerdown', 'keydown'] as const;

/** Says that this desk is open, for as long as somebody works at it, and knows who else is on the net. */
export function useDeskPresence(netId: string, { store, saving }: DeskSession): Presence | null {
  const [presence, setPresence] = useState<Presence | null>(null);

  useEffect(() => {
    const clientId = newUuid();
    const started = startPresence(store, clientId, presenceApi(netId, clientId), Date.now);
    setPresence(started);
    const endMoments = followAttention((away) => started.setAway(away));
    const endOthers = started.others.subscribe((others) => saving?.setWatched(others.length > 0));
    return () => {
      endMoments();
      endOthers();
      started.stop();
      setPresence(null);
    };
  }, [netId, store, saving]);

  useLive((message) => {
    const concerned = message.type === 'hello' || (message.type === 'presence' && message.netId === netId);
    if (concerned) presence?.refresh();
  });
  return presence;
}

/** Tells when nobody looks at the page any more, and when somebody does again. */
function followAttention(tell: (away: boolean) => void): () => void {
  let seenAt = Date.now();
  const seen = () => {
    seenAt = Date.now();
    tell(document.hidden);
  };
  const left = () => tell(true);
  const idle = setInterval(() => Date.now() - seenAt > IDLE_MS && left(), LOOK_MS);
  for (const sign of SIGNS) document.addEventListener(sign, seen, { passive: true });
  document.addEventListener('visibilitychange', seen);
  window.addEventListener('pagehide', left);
  window.addEventListener('pageshow', seen);
  seen();
  return () => {
    clearInterval(idle);
    for (const sign of SIGNS) document.removeEventListener(sign, seen);
    document.removeEventListener('visibilitychange', seen);
    window.removeEventListener('pagehide', left);
    window.removeEventListener('pageshow', seen);
  };
}
