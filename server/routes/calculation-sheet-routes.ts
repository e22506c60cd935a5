import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { sendStored } from '#server/http/send-stored.ts';
import {
  calculationSheetById,
  calculationSheetFile,
  calculationSheetsOf,
  createCalculationSheetService,
} from '#server/services/calculation-sheet-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import {
  calculationSheetDto,
  calculationSheetInput,
  calculationSheetListDto,
} from '#shared/contract/calculation-sheets.ts';
import { id } from '#shared/contract/common.ts';

const netParams = z.object({ netId: id });
const sheetParams = z.object({ netId: id, calculationSheetId: id });
const onNet = { who: 'dam', action: 'dam.read', target: 'net' } as const;

export const calculationSheetRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/nets/:netId/calculation-sheets',
    // Whoever may read the figures may have them on paper.
    access: onNet,
    params: netParams,
    body: calculationSheetInput,
    reply: calculationSheetDto,
    status: 202,
    handle: async ({ deps, params, body, actor }) => {
      await inTransaction(deps, (tx) => createCalculationSheetService(tx).ask(params.netId, body, actor));
      return calculationSheetById(deps.db.manager, params.netId, body.id);
    },
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/calculation-sheets',
    access: onNet,
    params: netParams,
    reply: calculationSheetListDto,
    handle: async ({ deps, params }) => ({ items: await calculationSheetsOf(deps.db.manager, params.netId) }),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/calculation-sheets/:calculationSheetId',
    access: onNet,
    params: sheetParams,
    reply: calculationSheetDto,
    handle: async ({ deps, params }) =>
      calculationSheetById(deps.db.manager, params.netId, params.calculationSheetId),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/calculation-sheets/:calculationSheetId/file',
    access: onNet,
    params: sheetParams,
    handle: async ({ deps, params, req, res }) => {
      const file = await calculationSheetFile(deps.db.manager, params.netId, params.calculationSheetId);
      res.attachment(file.fileName).type('application/pdf');
      await sendStored(deps.storage, file.key, req, res);
    },
  }),
];
