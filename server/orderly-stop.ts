import type { Server, ServerResponse } from 'node:http';

/** Long enough for an upload that is nearly done, short enough for a supervisor that waits. */
export const STOP_GRACE_MS = 20_000;

/**
 * Prepares a server for an orderly stop. The returned function takes no more connections, ends live streams,
 * which would never end by themselves, lets other requests finish within `graceMs`, and then cuts what is left.
 */
export function orderlyStop(server: Server): (graceMs: number) => Promise<void> {
  const streams = followStreams(server);
  return async (graceMs) => {
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    for (const stream of streams) if (isEventStream(stream)) stream.end();
    server.closeIdleConnections();
    const timer = setTimeout(() => server.closeAllConnections(), graceMs);
    await closed;
    clearTimeout(timer);
  };
}

function followStreams(server: Server): Set<ServerResponse> {
  const open = new Set<ServerResponse>();
  server.on('request', (_req, res: ServerResponse) => {
    open.add(res);
    res.once('close', () => open.delete(res));
  });
  return open;
}

const isEventStream = (res: ServerResponse) =>
  String(res.getHeader('content-type') ?? '').startsWith('text/event-stream');

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
