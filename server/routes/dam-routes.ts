import * as z from 'zod/mini';
import type { AppDeps } from '#server/app-deps.ts';
import { type Actor, defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { getDam, listDams } from '#server/services/dam-queries.ts';
import { createDamService } from '#server/services/dam-service.ts';
import { listEvents } from '#server/services/event-queries.ts';
import { createInvitationService } from '#server/services/invitation-service.ts';
import { getMember, listMembers } from '#server/services/member-queries.ts';
import { createMemberService } from '#server/services/member-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id, pageOf } from '#shared/contract/common.ts';
import {
  damDto,
  damInput,
  damListDto,
  damListQuery,
  damPatch,
  eventDto,
  memberDto,
  memberInviteInput,
  memberListDto,
  memberRolesInput,
} from '#shared/contract/dams.ts';
import { eventListQuery } from '#shared/contract/events.ts';

const damParams = z.object({ damId: id });
const memberParams = z.object({ damId: id, personId: id });
const onDam = <const A extends 'dam.read' | 'dam.edit' | 'dam.manageMembers' | 'dam.archive'>(action: A) =>
  ({ who: 'dam', action, target: 'dam' }) as const;

type DamService = ReturnType<typeof createDamService>;

/** Changes a dam and answers with how it is then. */
async function changeDam(
  deps: AppDeps,
  actor: Actor,
  damId: string,
  change: (dams: DamService) => Promise<void>,
) {
  await inTransaction(deps, (tx) => change(createDamService(tx)));
  return getDam(deps.db.manager, actor, damId);
}

const dams: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/dams',
    access: { who: 'signedIn' },
    query: damListQuery,
    reply: damListDto,
    handle: async ({ deps, actor, query }) => ({
      items: await listDams(deps.db.manager, actor, query.archived === 'yes'),
    }),
  }),
  defineRoute({
    method: 'post',
    path: '/dams',
    access: { who: 'global', action: 'dam.create' },
    body: damInput,
    reply: damDto,
    status: 201,
    handle: async ({ deps, actor, body }) => {
      const damId = await inTransaction(deps, (tx) => createDamService(tx).create(body, actor));
      return getDam(deps.db.manager, actor, damId);
    },
  }),
  defineRoute({
    method: 'get',
    path: '/dams/:damId',
    access: onDam('dam.read'),
    params: damParams,
    reply: damDto,
    handle: ({ deps, actor, params }) => getDam(deps.db.manager, actor, params.damId),
  }),
  defineRoute({
    method: 'patch',
    path: '/dams/:damId',
    access: onDam('dam.edit'),
    params: damParams,
    body: damPatch,
    reply: damDto,
    handle: ({ deps, actor, params, body }) =>
      changeDam(deps, actor, params.damId, (service) => service.change(params.damId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/dams/:damId/archive',
    access: onDam('dam.archive'),
    params: damParams,
    reply: damDto,
    handle: ({ deps, actor, params }) =>
      changeDam(deps, actor, params.damId, (service) => service.archive(params.damId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/dams/:damId/restore',
    access: onDam('dam.archive'),
    params: damParams,
    reply: damDto,
    handle: ({ deps, actor, params }) =>
      changeDam(deps, actor, params.damId, (service) => service.restore(params.damId, actor)),
  }),
  defineRoute({
    method: 'get',
    path: '/dams/:damId/events',
    access: onDam('dam.read'),
    params: damParams,
    query: eventListQuery,
    reply: pageOf(eventDto),
    handle: ({ deps, params, query }) => listEvents(deps.db.manager, params.damId, query.cursor, query),
  }),
];

const members: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/dams/:damId/members',
    access: onDam('dam.read'),
    params: damParams,
    reply: memberListDto,
    handle: async ({ deps, params }) => ({ items: await listMembers(deps.db.manager, params.damId) }),
  }),
  defineRoute({
    method: 'put',
    path: '/dams/:damId/members/:personId',
    access: onDam('dam.manageMembers'),
    params: memberParams,
    body: memberRolesInput,
    reply: memberDto,
    handle: async ({ deps, actor, params: { damId, personId }, body }) => {
      await inTransaction(deps, (tx) => createMemberService(tx).setRoles(damId, personId, body.roles, actor));
      return getMember(deps.db.manager, damId, personId);
    },
  }),
  defineRoute({
    method: 'delete',
    path: '/dams/:damId/members/:personId',
    access: onDam('dam.manageMembers'),
    params: memberParams,
    handle: ({ deps, actor, params }) =>
      inTransaction(deps, (tx) => createMemberService(tx).remove(params.damId, params.personId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/dams/:damId/members/invitations',
    access: onDam('dam.manageMembers'),
    params: damParams,
    body: memberInviteInput,
    reply: memberDto,
    status: 201,
    handle: async ({ deps, actor, params: { damId }, body }) => {
      const personId = await inTransaction(deps, (tx) =>
        createInvitationService(tx).inviteToDam(damId, body.email, body.roles, actor),
      );
      return getMember(deps.db.manager, damId, personId);
    },
  }),
];

export const damRoutes: RouteRecord[] = [...dams, ...members];
