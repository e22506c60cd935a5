import type { RouteRecord } from '#server/http/route-record.ts';
import { sessionRoutes } from './session-routes.ts';

/** Every route of the API. A record cannot be made without an access rule. */
export const routes: readonly RouteRecord[] = [...sessionRoutes];
