import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { Logger } from 'pino';
import { type HttpLogger, pinoHttp } from 'pino-http';

/** What supervisors ask every few seconds would bury the rest. */
const PROBES = new Set(['/healthz', '/readyz']);

const pathOf = (url: string | undefined) => (url ?? '').split('?', 1)[0] ?? '';

/**
 * One line for each request, with the number that errors show. Only what is named here is written: headers carry
 * the sign-in cookies, and the query of an invitation's address carries its token.
 */
export function requestLog(logger: Logger): HttpLogger {
  return pinoHttp({
    logger,
    genReqId: () => randomUUID(),
    autoLogging: { ignore: (req: IncomingMessage) => PROBES.has(pathOf(req.url)) },
    wrapSerializers: false,
    serializers: {
      req: (req: IncomingMessage) => ({ id: req.id, method: req.method, path: pathOf(originalUrl(req)) }),
      res: (res: ServerResponse) => ({ statusCode: res.statusCode }),
    },
  });
}

/** Express shortens `url` inside a mounted router. */
const originalUrl = (req: IncomingMessage & { originalUrl?: string }) => req.originalUrl ?? req.url;
