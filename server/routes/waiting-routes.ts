import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { waitingFor } from '#server/services/waiting-queries.ts';
import { waitingDto } from '#shared/contract/dams.ts';

export const waitingRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/waiting',
    access: { who: 'signedIn' },
    reply: waitingDto,
    handle: async ({ deps, actor }) => ({ items: await waitingFor(deps.db.manager, actor.id) }),
  }),
];
