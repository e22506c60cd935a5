import { setTimeout as delay } from 'node:timers/promises';
import * as z from 'zod/mini';
import { AppError } from '#server/errors/app-error.ts';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { startSession } from '#server/http/sign-in-strategy.ts';
import { maySendReset, throttled } from '#server/http/sign-in-throttle.ts';
import { listEvents } from '#server/services/event-queries.ts';
import { createInvitationService } from '#server/services/invitation-service.ts';
import { createPasswordResetService } from '#server/services/password-reset-service.ts';
import { createPersonService, listPeople } from '#server/services/person-service.ts';
import { findByPassword } from '#server/services/person-sign-in.ts';
import { toPersonDto } from '#server/services/person-state.ts';
import { inTransaction, readingDeps } from '#server/services/service-deps.ts';
import { id, pageOf, pageQuery } from '#shared/contract/common.ts';
import { eventDto } from '#shared/contract/dams.ts';
import {
  invitationAcceptInput,
  invitationDto,
  invitationLookup,
  invitePersonInput,
  meInput,
  passwordChangeInput,
  passwordResetInput,
  passwordResetRequest,
  personDto,
  personListDto,
  personPatch,
  sessionDto,
} from '#shared/contract/people.ts';
import { sessionReply } from './session-routes.ts';

/** Longer than writing a mail to the outbox takes, so that the time does not tell whether there was one to write. */
const RESET_ANSWER_MS = 250;

const wrongPassword = () =>
  new AppError(
    'wrong-credentials',
    422,
    'The password was not changed',
    'The current password is not right. Type it again, or sign out and reset it.',
  );

const byTokenRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/password-resets',
    access: { who: 'public' },
    body: passwordResetRequest,
    status: 202,
    handle: async ({ deps, req, body }) => {
      const send = await maySendReset(deps, req, body.email);
      const work = send && inTransaction(deps, (tx) => createPasswordResetService(tx).request(body.email));
      await Promise.all([work, delay(RESET_ANSWER_MS)]);
    },
  }),
  defineRoute({
    method: 'post',
    path: '/password-resets/complete',
    access: { who: 'public' },
    body: passwordResetInput,
    handle: ({ deps, body }) =>
      inTransaction(deps, (tx) => createPasswordResetService(tx).complete(body.token, body.password)),
  }),
  defineRoute({
    method: 'post',
    path: '/invitations/look-up',
    access: { who: 'public' },
    body: invitationLookup,
    reply: invitationDto,
    handle: ({ deps, body }) => createInvitationService(readingDeps(deps)).lookUp(body.token),
  }),
  defineRoute({
    method: 'post',
    path: '/invitations/accept',
    access: { who: 'public' },
    body: invitationAcceptInput,
    reply: sessionDto,
    handle: async ({ deps, req, body }) => {
      const actor = await inTransaction(deps, (tx) =>
        createInvitationService(tx).accept(body.token, body.name, body.password),
      );
      await startSession(req, actor);
      return sessionReply(deps, req, actor);
    },
  }),
];

const ownRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/me/password',
    access: { who: 'signedIn' },
    body: passwordChangeInput,
    handle: async ({ deps, req, actor, body }) => {
      const right = await throttled(deps, req, actor.email, () =>
        findByPassword(deps.db.manager, actor.email, body.current),
      );
      if (!right) throw wrongPassword();
      await inTransaction(deps, (tx) =>
        createPersonService(tx).setPassword(actor.id, body.next, req.sessionID),
      );
    },
  }),
  defineRoute({
    method: 'patch',
    path: '/me',
    access: { who: 'signedIn' },
    body: meInput,
    reply: personDto,
    handle: async ({ deps, actor, body }) =>
      toPersonDto(await inTransaction(deps, (tx) => createPersonService(tx).rename(actor, body.name))),
  }),
];

const managing = { who: 'global', action: 'people.manage' } as const;

const managingRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/people',
    access: managing,
    reply: personListDto,
    handle: async ({ deps }) => ({ items: (await listPeople(readingDeps(deps))).map(toPersonDto) }),
  }),
  defineRoute({
    method: 'get',
    path: '/events',
    access: managing,
    query: pageQuery,
    reply: pageOf(eventDto),
    handle: ({ deps, query }) => listEvents(deps.db.manager, null, query.cursor),
  }),
  defineRoute({
    method: 'post',
    path: '/people/invitations',
    access: managing,
    body: invitePersonInput,
    reply: personDto,
    status: 201,
    handle: async ({ deps, actor, body }) =>
      toPersonDto(
        await inTransaction(deps, (tx) =>
          createInvitationService(tx).inviteToInstallation(body.email, body.admin, actor),
        ),
      ),
  }),
  defineRoute({
    method: 'patch',
    path: '/people/:personId',
    access: managing,
    params: z.object({ personId: id }),
    body: personPatch,
    reply: personDto,
    handle: async ({ deps, actor, params, body }) =>
      toPersonDto(
        await inTransaction(deps, (tx) => createPersonService(tx).change(params.personId, body, actor)),
      ),
  }),
];

export const peopleRoutes: RouteRecord[] = [...byTokenRoutes, ...ownRoutes, ...managingRoutes];
