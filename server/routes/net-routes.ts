import * as z from 'zod/mini';
import type { AppDeps } from '#server/app-deps.ts';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { netDetail } from '#server/services/net-queries.ts';
import { createNetService } from '#server/services/net-service.ts';
import { netSummaryOf } from '#server/services/net-summaries.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import { netSummary } from '#shared/contract/drawings.ts';
import { netDetailDto, netInput, netPatch } from '#shared/contract/nets.ts';

const netParams = z.object({ netId: id });

/** Does `work` in a transaction and answers with the net as lists show it afterwards, which may have to be read first. */
async function changedNet(
  deps: AppDeps,
  netId: string,
  work: (service: ReturnType<typeof createNetService>) => Promise<void>,
) {
  await inTransaction(deps, (tx) => work(createNetService(tx)));
  return netSummaryOf(deps.db.manager, netId);
}

export const netRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/sections/:sectionId/nets',
    access: { who: 'dam', action: 'net.trace', target: 'section' },
    params: z.object({ sectionId: id }),
    body: netInput,
    reply: netSummary,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      changedNet(deps, body.id, (nets) => nets.create(params.sectionId, body, actor)),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    params: netParams,
    reply: netDetailDto,
    handle: async ({ deps, params, scope }) => netDetail(deps.db.manager, params.netId, scope),
  }),
  defineRoute({
    method: 'patch',
    path: '/nets/:netId',
    access: { who: 'dam', action: 'net.trace', target: 'net' },
    params: netParams,
    body: netPatch,
    reply: netSummary,
    handle: async ({ deps, params, body, actor }) =>
      changedNet(deps, params.netId, (nets) => nets.rename(params.netId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/nets/:netId/copy',
    access: { who: 'dam', action: 'net.trace', target: 'net' },
    params: netParams,
    body: netInput,
    reply: netSummary,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      changedNet(deps, body.id, (nets) => nets.copy(params.netId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/nets/:netId/archive',
    access: { who: 'dam', action: 'net.archive', target: 'net' },
    params: netParams,
    reply: netSummary,
    handle: async ({ deps, params, actor }) =>
      changedNet(deps, params.netId, (nets) => nets.archive(params.netId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/nets/:netId/restore',
    access: { who: 'dam', action: 'net.archive', target: 'net' },
    params: netParams,
    reply: netSummary,
    handle: async ({ deps, params, actor }) =>
      changedNet(deps, params.netId, (nets) => nets.restore(params.netId, actor)),
  }),
];
