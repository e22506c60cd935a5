import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { netDxf, revisionDxf } from '#server/services/dxf-queries.ts';
import { eventsFile } from '#server/services/event-export.ts';
import type { Download } from '#server/services/schedule-queries.ts';
import { id } from '#shared/contract/common.ts';
import { markOf } from '#shared/contract/downloads.ts';
import { eventFileQuery } from '#shared/contract/events.ts';

function sendDxf(res: Response, { fileName, text }: Download): void {
  res.setHeader('Cache-Control', 'no-store');
  res.attachment(fileName).type('image/vnd.dxf').send(Buffer.from(text, 'utf8'));
}

async function sendParts(parts: AsyncGenerator<string>, res: Response): Promise<void> {
  await pipeline(Readable.from(parts), res).catch((error: NodeJS.ErrnoException) => {
    // The reader went away.
    if (error.code !== 'ERR_STREAM_PREMATURE_CLOSE') throw error;
  });
}

/** Files made of what is kept, for other programs. */
export const downloadRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/nets/:netId/traces.dxf',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    params: z.object({ netId: id }),
    handle: async ({ deps, params, res }) => sendDxf(res, await netDxf(deps.db.manager, params.netId)),
  }),
  defineRoute({
    method: 'get',
    path: '/revisions/:revisionId/traces.dxf',
    access: { who: 'dam', action: 'dam.read', target: 'revision' },
    params: z.object({ revisionId: id }),
    handle: async ({ deps, params, res }) =>
      sendDxf(res, await revisionDxf(deps.db.manager, params.revisionId)),
  }),
  defineRoute({
    method: 'get',
    path: '/dams/:damId/events.csv',
    access: { who: 'dam', action: 'dam.read', target: 'dam' },
    params: z.object({ damId: id }),
    query: eventFileQuery,
    handle: async ({ deps, params, query, res }) => {
      const { fileName, parts } = await eventsFile(deps.db.manager, params.damId, query, markOf(query));
      res.setHeader('Cache-Control', 'no-store');
      res.attachment(fileName).type('text/csv; charset=utf-8');
      await sendParts(parts, res);
    },
  }),
];
