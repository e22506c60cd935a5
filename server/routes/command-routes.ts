import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { changesSince } from '#server/services/command-queries.ts';
import { createCommandService, hasConflict } from '#server/services/command-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import { changesDto, changesQuery, commandBatch, commandResult } from '#shared/contract/nets.ts';

const netParams = z.object({ netId: id });

export const commandRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/nets/:netId/commands',
    access: { who: 'dam', action: 'net.trace', target: 'net' },
    params: netParams,
    body: commandBatch,
    reply: commandResult,
    handle: async ({ deps, params, body, actor, res }) => {
      const result = await inTransaction(deps, (tx) =>
        createCommandService(tx).apply(params.netId, body, actor),
      );
      if (hasConflict(result)) res.status(409);
      return result;
    },
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/changes',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    params: netParams,
    query: changesQuery,
    reply: changesDto,
    handle: async ({ deps, params, query }) => changesSince(deps.db.manager, params.netId, query.since),
  }),
];
