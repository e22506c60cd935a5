import * as z from 'zod/mini';
import { notFound } from '#server/errors/app-error.ts';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { sendStored } from '#server/http/send-stored.ts';
import { withReceivedFile } from '#server/http/upload.ts';
import { drawSheetAgain } from '#server/services/draw-again-service.ts';
import { getDrawing, listDrawings, originalOf } from '#server/services/drawing-queries.ts';
import { createDrawingService } from '#server/services/drawing-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { sheetFileKey, thumbnailOf } from '#server/services/sheet-files.ts';
import { id } from '#shared/contract/common.ts';
import {
  drawingDto,
  drawingListDto,
  drawingListQuery,
  drawingPatch,
  uploadQuery,
} from '#shared/contract/drawings.ts';
import { drawAgainInput } from '#shared/contract/page-dpi.ts';

const drawingParams = z.object({ drawingId: id });
const onDrawing = <const A extends 'dam.read' | 'drawing.edit' | 'drawing.archive'>(action: A) =>
  ({ who: 'dam', action, target: 'drawing' }) as const;
const readSheet = { who: 'dam', action: 'dam.read', target: 'sheet' } as const;
const number = z.coerce.number().check(z.int(), z.gte(0));

export const drawingRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/dams/:damId/drawings',
    access: { who: 'dam', action: 'dam.read', target: 'dam' },
    params: z.object({ damId: id }),
    query: drawingListQuery,
    reply: drawingListDto,
    handle: async ({ deps, params, query, actor }) => ({
      items: await listDrawings(deps.db.manager, params.damId, query.archived === 'yes', actor.id),
    }),
  }),
  defineRoute({
    method: 'post',
    path: '/dams/:damId/drawings',
    access: { who: 'dam', action: 'drawing.upload', target: 'dam' },
    params: z.object({ damId: id }),
    query: uploadQuery,
    reply: drawingDto,
    status: 201,
    handle: async ({ deps, params, query, actor, req, res }) =>
      withReceivedFile(deps, req, res, (file) =>
        inTransaction(deps, (tx) =>
          createDrawingService(tx).takeIn(params.damId, file, query.again === 'yes', actor),
        ),
      ),
  }),
  defineRoute({
    method: 'get',
    path: '/drawings/:drawingId',
    access: onDrawing('dam.read'),
    params: drawingParams,
    reply: drawingDto,
    handle: async ({ deps, params, actor }) => getDrawing(deps.db.manager, params.drawingId, actor.id),
  }),
  defineRoute({
    method: 'patch',
    path: '/drawings/:drawingId',
    access: onDrawing('drawing.edit'),
    params: drawingParams,
    body: drawingPatch,
    reply: drawingDto,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createDrawingService(tx).change(params.drawingId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/drawings/:drawingId/prepare-again',
    access: onDrawing('drawing.edit'),
    params: drawingParams,
    reply: drawingDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createDrawingService(tx).prepareAgain(params.drawingId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/sheets/:sheetId/draw-again',
    access: { who: 'dam', action: 'drawing.edit', target: 'sheet' },
    params: z.object({ sheetId: id }),
    body: drawAgainInput,
    reply: drawingDto,
    handle: async ({ deps, params, body, actor }) => {
      const { drawingId, oldTiles } = await inTransaction(deps, (tx) =>
        drawSheetAgain(tx, params.sheetId, body.dpi, actor),
      );
      await deps.storage.deletePrefix(oldTiles);
      return getDrawing(deps.db.manager, drawingId, actor.id);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/drawings/:drawingId/archive',
    access: onDrawing('drawing.archive'),
    params: drawingParams,
    reply: drawingDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createDrawingService(tx).archive(params.drawingId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/drawings/:drawingId/restore',
    access: onDrawing('drawing.archive'),
    params: drawingParams,
    reply: drawingDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createDrawingService(tx).restore(params.drawingId, actor)),
  }),
  defineRoute({
    method: 'get',
    path: '/drawings/:drawingId/original',
    access: onDrawing('dam.read'),
    params: drawingParams,
    handle: async ({ deps, params, req, res }) => {
      const { fileName, mediaType, key } = await originalOf(deps.db.manager, params.drawingId);
      // Always as a download: what somebody uploaded is never shown as a page of this site.
      res.attachment(fileName).setHeader('Content-Type', mediaType);
      res.setHeader('Content-Security-Policy', "sandbox; default-src 'none'");
      await sendStored(deps.storage, key, req, res);
    },
  }),
  defineRoute({
    method: 'get',
    path: '/sheets/:sheetId/thumbnail',
    access: readSheet,
    params: z.object({ sheetId: id }),
    handle: async ({ deps, params, req, res }) => {
      res.type('image/webp');
      await sendStored(deps.storage, await thumbnailOf(deps.db.manager, params.sheetId), req, res);
    },
  }),
  defineRoute({
    method: 'get',
    path: '/sheets/:sheetId/tiles/:rendition/:z/:tile',
    access: readSheet,
    params: z.object({
      sheetId: id,
      rendition: z.string(),
      z: number,
      /** `<column>_<row>` */
      tile: z.string().check(z.regex(/^\d{1,6}_\d{1,6}$/)),
    }),
    handle: async ({ deps, params, req, res }) => {
      const [x = 0, y = 0] = params.tile.split('_').map(Number);
      const tile = { ...params, x, y };
      const file = await sheetFileKey(deps.db.manager, tile);
      if (!file) throw notFound('The sheet has no such tile.');
      res.type(file.mediaType);
      await sendStored(deps.storage, file.key, req, res);
    },
  }),
];
