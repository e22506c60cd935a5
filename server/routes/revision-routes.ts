import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { revisionDetail, revisionsOfNet } from '#server/services/revision-queries.ts';
import { createRevisionService } from '#server/services/revision-service.ts';
import { sendingOf } from '#server/services/sending-queries.ts';
import { createSendingService } from '#server/services/sending-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import {
  acceptanceWithdrawalInput,
  decisionInput,
  revisionDto,
  revisionListDto,
  revisionSummary,
  sendInput,
  sendingDto,
  sendingWithdrawalInput,
} from '#shared/contract/revisions.ts';
import { signed } from './signed.ts';

const netParams = z.object({ netId: id });
const revisionParams = z.object({ revisionId: id });

export const revisionRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/nets/:netId/sending',
    access: { who: 'dam', action: 'net.send', target: 'net' },
    params: netParams,
    reply: sendingDto,
    handle: async ({ deps, params, actor }) => sendingOf(deps.db.manager, params.netId, actor.id),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/revisions',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    figures: 'none',
    params: netParams,
    reply: revisionListDto,
    handle: async ({ deps, params }) => ({ items: await revisionsOfNet(deps.db.manager, params.netId) }),
  }),
  defineRoute({
    method: 'post',
    path: '/nets/:netId/revisions',
    access: { who: 'dam', action: 'net.send', target: 'net' },
    params: netParams,
    body: sendInput,
    reply: revisionSummary,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createSendingService(tx).send(params.netId, body, actor)),
  }),
  defineRoute({
    method: 'get',
    path: '/revisions/:revisionId',
    access: { who: 'dam', action: 'dam.read', target: 'revision' },
    params: revisionParams,
    reply: revisionDto,
    handle: async ({ deps, params, actor, scope }) =>
      revisionDetail(deps.db.manager, params.revisionId, actor, scope),
  }),
  defineRoute({
    method: 'post',
    path: '/revisions/:revisionId/decision',
    access: { who: 'dam', action: 'revision.decide', target: 'revision' },
    params: revisionParams,
    body: decisionInput,
    reply: revisionDto,
    status: 201,
    handle: async ({ deps, req, params, body, actor, scope }) =>
      signed(deps, req, actor, body.password, async (tx) => {
        await createRevisionService(tx).decide(params.revisionId, body, actor);
        return revisionDetail(tx.manager, params.revisionId, actor, scope);
      }),
  }),
  defineRoute({
    method: 'post',
    path: '/revisions/:revisionId/acceptance-withdrawals',
    access: { who: 'dam', action: 'revision.decide', target: 'revision' },
    params: revisionParams,
    body: acceptanceWithdrawalInput,
    reply: revisionDto,
    status: 201,
    handle: async ({ deps, req, params, body, actor, scope }) =>
      signed(deps, req, actor, body.password, async (tx) => {
        await createRevisionService(tx).withdrawAcceptance(params.revisionId, body, actor);
        return revisionDetail(tx.manager, params.revisionId, actor, scope);
      }),
  }),
  defineRoute({
    method: 'post',
    path: '/revisions/:revisionId/sending-withdrawals',
    access: { who: 'dam', action: 'net.send', target: 'revision' },
    params: revisionParams,
    body: sendingWithdrawalInput,
    reply: revisionDto,
    status: 201,
    handle: async ({ deps, params, body, actor, scope }) =>
      inTransaction(deps, async (tx) => {
        await createRevisionService(tx).withdrawSending(params.revisionId, body, actor);
        return revisionDetail(tx.manager, params.revisionId, actor, scope);
      }),
  }),
];
