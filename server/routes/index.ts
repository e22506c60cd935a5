import type { RouteRecord } from '#server/http/route-record.ts';
import { archiveRoutes } from './archive-routes.ts';
import { calculationSheetRoutes } from './calculation-sheet-routes.ts';
import { checkListRoutes } from './check-list-routes.ts';
import { commandRoutes } from './command-routes.ts';
import { damRoutes } from './dam-routes.ts';
import { damSeepageRoutes } from './dam-seepage-routes.ts';
import { downloadRoutes } from './download-routes.ts';
import { drawingRoutes } from './drawing-routes.ts';
import { liveRoutes } from './live-routes.ts';
import { mailRoutes } from './mail-routes.ts';
import { netFileRoutes } from './net-file-routes.ts';
import { netRoutes } from './net-routes.ts';
import { noteRoutes } from './note-routes.ts';
import { peopleRoutes } from './people-routes.ts';
import { presenceRoutes } from './presence-routes.ts';
import { registerRoutes } from './register-routes.ts';
import { renditionRoutes } from './rendition-routes.ts';
import { reviewRoutes } from './review-routes.ts';
import { revisionRoutes } from './revision-routes.ts';
import { scheduleRoutes } from './schedule-routes.ts';
import { sectionRoutes } from './section-routes.ts';
import { sessionRoutes } from './session-routes.ts';
import { waitingRoutes } from './waiting-routes.ts';

/** Every route of the API. A record cannot be made without an access rule. */
export const routes: readonly RouteRecord[] = [
  ...sessionRoutes,
  ...peopleRoutes,
  ...damRoutes,
  ...checkListRoutes,
  ...damSeepageRoutes,
  ...archiveRoutes,
  ...registerRoutes,
  ...waitingRoutes,
  ...liveRoutes,
  ...mailRoutes,
  ...drawingRoutes,
  ...renditionRoutes,
  ...sectionRoutes,
  ...netRoutes,
  ...netFileRoutes,
  ...commandRoutes,
  ...presenceRoutes,
  ...scheduleRoutes,
  ...downloadRoutes,
  ...noteRoutes,
  ...revisionRoutes,
  ...reviewRoutes,
  ...calculationSheetRoutes,
];
