import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { createPresenceService } from '#server/services/presence-service.ts';
import { inTransaction, readingDeps } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import { presenceBeat, presenceDto } from '#shared/contract/presence.ts';

const netParams = z.object({ netId: id });
const deskParams = z.object({ netId: id, clientId: id });
const access = { who: 'dam', action: 'dam.read', target: 'net' } as const;

export const presenceRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/nets/:netId/presence',
    access,
    params: netParams,
    reply: presenceDto,
    handle: async ({ deps, params }) => createPresenceService(readingDeps(deps)).present(params.netId),
  }),
  defineRoute({
    method: 'put',
    path: '/nets/:netId/presence/:clientId',
    access,
    params: deskParams,
    body: presenceBeat,
    reply: presenceDto,
    handle: async ({ deps, params, body, actor, scope }) =>
      inTransaction(deps, (tx) =>
        createPresenceService(tx).beat({ ...params, damId: scope.damId }, actor, body),
      ),
  }),
  defineRoute({
    method: 'delete',
    path: '/nets/:netId/presence/:clientId',
    access,
    params: deskParams,
    handle: async ({ deps, params, actor, scope }) =>
      inTransaction(deps, (tx) => createPresenceService(tx).leave({ ...params, damId: scope.damId }, actor)),
  }),
];
