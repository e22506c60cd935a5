import express, { type Request, type RequestHandler, type Response, Router } from 'express';
import * as z from 'zod/mini';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError } from '#server/errors/app-error.ts';
import { authorise } from './authorise.ts';
import { isCsrfTokenValid } from './csrf.ts';
import { refuseKeptBack } from './kept-back.ts';
import type { RouteRecord } from './route-record.ts';
import { parseInput } from './validate.ts';

/** A batch of commands with 5,000-vertex lines stays well below this. */
const jsonBody = express.json({ limit: '8mb' });

const parseJson = (req: Request, res: Response) =>
  new Promise<void>((resolve, reject) => {
    jsonBody(req, res, (error?: unknown) => (error ? reject(error) : resolve()));
  });

function requireCsrfToken(record: RouteRecord, req: Request): void {
  // What a signed link does is decided by its signature alone, whatever session the request may carry.
  if (record.method === 'get' || record.access.who === 'signedLink' || isCsrfTokenValid(req)) return;
  throw new AppError(
    'csrf',
    403,
    'The page is out of date',
    'This page was opened before your sign-in changed. Reload it; unsaved work is kept in this browser.',
  );
}

/** The same order for every route: who, may they, is the write ours, is the input right, do it, strip the reply. */
function handlerOf(record: RouteRecord, deps: AppDeps): RequestHandler {
  return async (req, res) => {
    const { actor, scope } = await authorise(record.access, req, deps);
    requireCsrfToken(record, req);
    await refuseKeptBack(deps.db.manager, record, req, { actor, scope });
    if (record.body) await parseJson(req, res);
    const input = parseInput(record, { params: req.params, query: req.query, body: req.body });
    const result = await record.handle({ ...input, actor, scope, deps, req, res });
    if (res.headersSent) return;
    if (!record.reply) {
      res.status(record.status).end();
      return;
    }
    res.status(res.statusCode === 200 ? record.status : res.statusCode).json(z.parse(record.reply, result));
  };
}

/** A router that answers every record; two records for one method and path refuse to start. */
export function mountRoutes(records: readonly RouteRecord[], deps: AppDeps): Router {
  const router = Router();
  const seen = new Set<string>();
  for (const record of records) {
    const name = `${record.method} ${record.path}`;
    if (seen.has(name)) throw new Error(`The route ${name} is defined twice.`);
    seen.add(name);
    router[record.method](record.path, handlerOf(record, deps));
  }
  return router;
}
