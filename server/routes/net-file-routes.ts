import * as z from 'zod/mini';
import { storeBlankSheet } from '#server/http/blank-sheet.ts';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { planBlankSheet, takeOnBlankSheet } from '#server/services/net-file-on-blank.ts';
import { createNetFileService } from '#server/services/net-file-service.ts';
import { netSummaryOf } from '#server/services/net-summaries.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import { netFileDto, netFileInput, netFileOnBlankInput } from '#shared/contract/net-files.ts';

export const netFileRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/sections/:sectionId/net-files',
    // Who may trace may also set the section out, which a file does where no known points are.
    access: { who: 'dam', action: 'net.trace', target: 'section' },
    params: z.object({ sectionId: id }),
    body: netFileInput,
    reply: netFileDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) => {
      const told = await inTransaction(deps, (tx) =>
        createNetFileService(tx).take(params.sectionId, body, actor),
      );
      return { net: await netSummaryOf(deps.db.manager, body.id), told };
    },
  }),
  defineRoute({
    method: 'post',
    path: '/dams/:damId/net-files',
    access: { who: 'dam', action: 'drawing.upload', target: 'dam' },
    params: z.object({ damId: id }),
    body: netFileOnBlankInput,
    reply: netFileDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) => {
      const { damId } = params;
      const plan = await planBlankSheet(deps.db.manager, damId, body);
      const blank = await storeBlankSheet(deps, plan);
      const told = await inTransaction(deps, (tx) => takeOnBlankSheet(tx, damId, plan, blank, body, actor));
      return { net: await netSummaryOf(deps.db.manager, body.id), told };
    },
  }),
];
