import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { damSeepageOf } from '#server/services/dam-seepage-queries.ts';
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
    handle: ({ deps, params, query }) => damSeepageOf(deps.db.manager, params.damId, query.nets),
  }),
];
