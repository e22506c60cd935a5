import type { Request } from 'express';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError } from '#server/errors/app-error.ts';
import { csrfTokenOf } from '#server/http/csrf.ts';
import { type Actor, defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { checkCredentials, endSession, startSession } from '#server/http/sign-in-strategy.ts';
import { throttled } from '#server/http/sign-in-throttle.ts';
import { endSessionsOf } from '#server/services/person-sessions.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { describeSession } from '#server/services/session-service.ts';
import { sessionDto, signInInput } from '#shared/contract/people.ts';

/** The reply after anything that changed who is signed in: a session made anew has a new token. */
export const sessionReply = (deps: AppDeps, req: Request, actor: Actor | null) =>
  describeSession(deps.config, actor, csrfTokenOf(req));

/** The same words for an unknown address, a wrong password and a person who may no longer sign in. */
const wrongCredentials = () =>
  new AppError(
    'wrong-credentials',
    401,
    'Not signed in',
    'E-mail and password do not belong together. Check both, or reset your password.',
  );

export const sessionRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/session',
    access: { who: 'public' },
    reply: sessionDto,
    handle: async ({ deps, req, res, actor }) => {
      res.setHeader('Cache-Control', 'no-store');
      return sessionReply(deps, req, actor);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/session',
    access: { who: 'public' },
    body: signInInput,
    reply: sessionDto,
    handle: async ({ deps, req, body }) => {
      const actor = await throttled(deps, req, body.email, () => checkCredentials(deps, req));
      if (!actor) throw wrongCredentials();
      await startSession(req, actor);
      return sessionReply(deps, req, actor);
    },
  }),
  defineRoute({
    method: 'delete',
    path: '/session',
    access: { who: 'public' },
    reply: sessionDto,
    handle: async ({ deps, req, actor }) => {
      await endSession(req);
      if (actor) await deps.live.publish(deps.db.manager, { type: 'person', personId: actor.id });
      return sessionReply(deps, req, null);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/session/end-all',
    access: { who: 'signedIn' },
    reply: sessionDto,
    handle: async ({ deps, req, actor }) => {
      await endSession(req);
      await inTransaction(deps, (tx) => endSessionsOf(tx, actor.id));
      return sessionReply(deps, req, null);
    },
  }),
];
