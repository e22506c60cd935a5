import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { listRenditions } from '#server/services/rendition-queries.ts';
import { createRenditionService } from '#server/services/rendition-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import {
  renditionDto,
  renditionInput,
  renditionListDto,
  showRenditionInput,
} from '#shared/contract/renditions.ts';

const params = z.object({ sheetId: id });
const onSheet = { who: 'dam', action: 'drawing.edit', target: 'sheet' } as const;

export const renditionRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/sheets/:sheetId/renditions',
    access: { who: 'dam', action: 'dam.read', target: 'sheet' },
    params,
    reply: renditionListDto,
    handle: async ({ deps, params }) => ({ items: await listRenditions(deps.db.manager, params.sheetId) }),
  }),
  defineRoute({
    method: 'post',
    path: '/sheets/:sheetId/renditions',
    access: onSheet,
    params,
    body: renditionInput,
    reply: renditionDto,
    status: 202,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createRenditionService(tx).ask(params.sheetId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/sheets/:sheetId/show-rendition',
    access: onSheet,
    params,
    body: showRenditionInput,
    reply: renditionListDto,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, async (tx) => {
        await createRenditionService(tx).show(params.sheetId, body.renditionId, actor);
        return { items: await listRenditions(tx.manager, params.sheetId) };
      }),
  }),
];
