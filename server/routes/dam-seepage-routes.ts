import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { damSeepageOf } from '#server/services/dam-seepage-queries.ts';
import { refuseKeptBackNets } from '#server/services/figures-kept-back.ts';
import { id } from '#shared/contract/common.ts';
import { damSeepageDto, damSeepageQuery } from '#shared/contract/dam-seepage.ts';

export const damSeepageRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/dams/:damId/seepage',
    access: { who: 'dam', action: 'dam.read', target: 'dam' },
    params: z.object({ damId: id }),
    query: damSeepageQuery,
    reply: damSeepageDto,
    handle: async ({ deps, params, query, actor }) => {
      await refuseKeptBackNets(deps.db.manager, query.nets, actor.id);
      return damSeepageOf(deps.db.manager, params.damId, query.nets);
    },
  }),
];
