import type { Response } from 'express';
import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { type Download, documentFile, scheduleFile, scheduleOf } from '#server/services/schedule-queries.ts';
import { id } from '#shared/contract/common.ts';
import { csvQuery, markOf } from '#shared/contract/downloads.ts';
import { netReading } from '#shared/contract/reading.ts';

const netParams = z.object({ netId: id });
const onNet = { who: 'dam', action: 'dam.read', target: 'net' } as const;

function sendFile(res: Response, { fileName, text }: Download): void {
  res.setHeader('Cache-Control', 'no-store');
  res.attachment(fileName).send(text);
}

export const scheduleRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/nets/:netId/schedule',
    access: onNet,
    params: netParams,
    reply: netReading,
    handle: async ({ deps, params }) => scheduleOf(deps.db.manager, params.netId),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/schedule.csv',
    access: onNet,
    params: netParams,
    query: csvQuery,
    handle: async ({ deps, params, query, res }) =>
      sendFile(res, await scheduleFile(deps.db.manager, params.netId, markOf(query))),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/document',
    access: onNet,
    params: netParams,
    handle: async ({ deps, params, res }) => sendFile(res, await documentFile(deps.db.manager, params.netId)),
  }),
];
