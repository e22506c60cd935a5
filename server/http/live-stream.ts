import type { Request, Response } from 'express';
import type { AppDeps } from '#server/app-deps.ts';
import { type LiveAccess, loadLiveAccess, mayHear } from '#server/services/live-access.ts';
import type { LiveEvent } from '#shared/contract/live.ts';
import type { Actor } from './route-record.ts';

/** Shorter than proxies and browsers wait on a silent connection. */
export const HEARTBEAT_MS = 15_000;

const message = (event: LiveEvent | { type: 'hello' }) =>
  `event: ${event.type}\ndata: ${JSON.stringify(event)}\n\n`;

/**
 * Answers with a stream of events (text/event-stream) for as long as the session lasts. Whether the person may
 * still listen, and to which dams, is asked again when something about them changed and at every heartbeat.
 */
export async function openLiveStream(
  deps: AppDeps,
  req: Request,
  res: Response,
  actor: Actor,
  heartbeatMs = HEARTBEAT_MS,
): Promise<void> {
  const sid = req.sessionID;
  const load = () => loadLiveAccess(deps.db.manager, actor.id, sid);
  let access: LiveAccess | null = await load();
  let work = Promise.resolve();

  async function lookAgain(): Promise<void> {
    access = await load();
    if (!access) res.end();
  }
  async function pass(event: LiveEvent): Promise<void> {
    if (event.type === 'person' && event.personId === actor.id) await lookAgain();
    if (access && mayHear(access, event) && res.writable) res.write(message(event));
  }
  /** One after the other, so that nothing is passed on while it is being asked whether it may be. */
  function inTurn(step: () => Promise<void>): void {
    work = work.then(step).catch((error: unknown) => {
      // Better no stream than one nobody knows to be allowed; the browser opens it again.
      deps.logger.warn({ err: error }, 'a live stream was ended');
      res.end();
    });
  }
  const hello = async () => {
    if (res.writable) res.write(message({ type: 'hello' }));
  };

  res.status(200).set({
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'no-store, no-transform',
    // Proxies that collect answers before passing them on leave this one alone.
    'X-Accel-Buffering': 'no',
  });
  res.flushHeaders();
  const unsubscribe = deps.live.subscribe(
    (event) => inTurn(() => pass(event)),
    () => inTurn(hello),
  );
  const heartbeat = setInterval(() => {
    if (res.writable) res.write(': still here\n\n');
    inTurn(lookAgain);
  }, heartbeatMs);
  res.on('close', () => {
    clearInterval(heartbeat);
    unsubscribe();
  });
  // Only after subscribing: what is fetched on hearing this misses nothing.
  inTurn(hello);
}
