import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { changeCheckList, checkListDtoOf } from '#server/services/check-list-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { checkListDto, checkListInput } from '#shared/contract/check-list.ts';
import { id } from '#shared/contract/common.ts';

const params = z.object({ damId: id });

/** The list that a dam's reviewers answer; its team edits it with the dam's other settings. */
export const checkListRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/dams/:damId/check-list',
    access: { who: 'dam', action: 'dam.read', target: 'dam' },
    params,
    reply: checkListDto,
    handle: async ({ deps, params: { damId } }) => checkListDtoOf(deps.db.manager, damId),
  }),
  defineRoute({
    method: 'put',
    path: '/dams/:damId/check-list',
    access: { who: 'dam', action: 'dam.edit', target: 'dam' },
    params,
    body: checkListInput,
    reply: checkListDto,
    handle: async ({ deps, params: { damId }, body, actor }) =>
      inTransaction(deps, async (tx) => {
        await changeCheckList(tx, damId, body.items, actor);
        return checkListDtoOf(tx.manager, damId);
      }),
  }),
];
