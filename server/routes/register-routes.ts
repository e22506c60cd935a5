import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { listRegister } from '#server/services/register-queries.ts';
import { registerPage, registerQuery } from '#shared/contract/register.ts';

export const registerRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/register',
    access: { who: 'signedIn' },
    query: registerQuery,
    reply: registerPage,
    handle: ({ deps, actor, query }) => listRegister(deps.db.manager, actor, query),
  }),
];
