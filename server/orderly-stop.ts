import type { Server, ServerResponse } from 'node:http';
import type { Socket } from 'node:net';

/** Long enough for an upload that is nearly done, short enough for a supervisor that waits. */
export const STOP_GRACE_MS = 20_000;

/**
 * Prepares a server for an orderly stop. The returned function takes no more connections, ends live streams,
 * which would never end by themselves, lets other requests finish within `graceMs`, and then cuts what is left.
 */
export function orderlyStop(server: Server): (graceMs: number) => Promise<void> {
  const { sockets, responses } = followTraffic(server);
  return async (graceMs) => {
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    for (const response of responses) {
      // The head said "keep-alive" before anybody knew; the connection goes with its last answer.
      response.once('close', () => setImmediate(() => server.closeIdleConnections()));
      if (isEventStream(response)) response.end();
    }
    const busy = new Set([...responses].map((response) => response.req.socket));
    // Browsers open connections in advance; Node counts one that never carried a request as not idle.
    for (const socket of sockets) if (!busy.has(socket)) socket.destroy();
    const timer = setTimeout(() => server.closeAllConnections(), graceMs);
    await closed;
    clearTimeout(timer);
  };
}

function followTraffic(server: Server): { sockets: Set<Socket>; responses: Set<ServerResponse> } {
  const sockets = new Set<Socket>();
  const responses = new Set<ServerResponse>();
  server.on('connection', (socket) => {
    sockets.add(socket);
    socket.once('close', () => sockets.delete(socket));
  });
  server.on('request', (_request, response: ServerResponse) => {
    responses.add(response);
    response.once('close', () => responses.delete(response));
  });
  return { sockets, responses };
}

/** By what the browser asked for: headers given to writeHead cannot be read back. */
const isEventStream = (response: ServerResponse) =>
  (response.req.headers.accept ?? '').includes('text/event-stream');

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
