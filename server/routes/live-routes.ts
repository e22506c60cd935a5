import { openLiveStream } from '#server/http/live-stream.ts';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';

export const liveRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/live',
    access: { who: 'signedIn' },
    handle: ({ deps, req, res, actor }) => openLiveStream(deps, req, res, actor),
  }),
];
