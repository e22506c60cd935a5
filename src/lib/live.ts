import * as z from 'zod/mini';
import { type LiveEvent, liveEvent } from '#shared/contract/live.ts';
import { apiUrl } from './http.ts';
import { onSignInMoment } from './sign-in-state.ts';

/** `hello`: the stream has (re)opened and may have missed something, so what is shown has to be fetched again. */
export type LiveMessage = LiveEvent | { type: 'hello' };
export type LiveListener = (message: LiveMessage) => void;

const NAME = 'tracehead-live';
const REOPEN_MS = 15_000;
const LIVE_TYPES = liveEvent.def.options.flatMap((option) => option.shape.type.def.values);

const listeners = new Set<LiveListener>();
let close: (() => void) | null = null;

/**
 * Hears what others change, until the returned function is called. A browser holds one stream for all its tabs
 * (HTTP/1.1 allows six connections to a host): the tab with the lock has it and passes on what it hears.
 */
export function listenLive(listener: LiveListener): () => void {
  listeners.add(listener);
  close ??= 'locks' in navigator ? shareStream() : openStream(tell);
  return () => {
    listeners.delete(listener);
    if (listeners.size > 0) return;
    close?.();
    close = null;
  };
}

function tell(message: LiveMessage): void {
  for (const listener of [...listeners]) listener(message);
}

function shareStream(): () => void {
  const channel = new BroadcastChannel(NAME);
  const left = new AbortController();
  channel.onmessage = (event: MessageEvent<LiveMessage>) => tell(event.data);
  const lead = () =>
    new Promise<void>((resolve) => {
      // Granted just as this tab stopped listening.
      if (left.signal.aborted) return resolve();
      const end = openStream((message) => {
        tell(message);
        channel.postMessage(message);
      });
      left.signal.addEventListener('abort', () => {
        end();
        resolve();
      });
    });
  navigator.locks.request(NAME, { signal: left.signal }, lead).catch(() => {
    // Given up waiting because this tab no longer listens.
  });
  return () => {
    left.abort();
    channel.close();
  };
}

/** The stream itself. The browser reopens a broken one; one that was refused (signed out) is tried again later. */
function openStream(on: LiveListener): () => void {
  let source: EventSource | null = null;
  let timer: ReturnType<typeof setTimeout> | null = null;
  const open = () => {
    if (timer) clearTimeout(timer);
    timer = null;
    source?.close();
    source = new EventSource(apiUrl('/live'));
    source.addEventListener('hello', () => on({ type: 'hello' }));
    for (const type of LIVE_TYPES)
      source.addEventListener(type, (event: MessageEvent<string>) => passOn(event, on));
    source.onerror = () => {
      if (source?.readyState === EventSource.CLOSED) timer ??= setTimeout(open, REOPEN_MS);
    };
  };
  const endMoments = onSignInMoment((moment) => (moment === 'signedIn' ? open() : source?.close()));
  open();
  return () => {
    endMoments();
    if (timer) clearTimeout(timer);
    source?.close();
  };
}

function passOn(event: MessageEvent<string>, on: LiveListener): void {
  const parsed = z.safeParse(liveEvent, JSON.parse(event.data));
  // An event this page does not know comes from a newer server; the page learns of it when it is reloaded.
  if (parsed.success) on(parsed.data);
}
