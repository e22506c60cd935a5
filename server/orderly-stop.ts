import type { Server } from 'node:http';

/** Long enough for an upload that is nearly done, short enough for a supervisor that waits. */
export const STOP_GRACE_MS = 20_000;

/**
 * Stops a server in order: takes no more connections, lets requests in flight finish within `graceMs`, then
 * cuts what is left. Live streams never end by themselves, so they are told by `beforeWait`.
 */
export async function stopServer(server: Server, graceMs: number, beforeWait: () => void): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  beforeWait();
  server.closeIdleConnections();
  const timer = setTimeout(() => server.closeAllConnections(), graceMs);
  await closed;
  clearTimeout(timer);
}

/** Calls `stop` once, at the first signal, or when the process that started this one has gone. */
export function onStopAsked(stop: () => Promise<void>): void {
  let stopping = false;
  const once = () => {
    if (stopping) return;
    stopping = true;
    void stop();
  };
  process.on('SIGTERM', once);
  process.on('SIGINT', once);
  process.on('disconnect', once);
}
