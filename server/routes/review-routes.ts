import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { createBlindReadingService } from '#server/services/blind-reading-service.ts';
import { blindViewOf } from '#server/services/blind-view.ts';
import { createCheckDraftService } from '#server/services/check-draft-service.ts';
import { revisionDetail } from '#server/services/revision-queries.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import { blindDto, blindReadingInput, checkDraftDto, checkDraftPatch } from '#shared/contract/review.ts';
import { revisionDto } from '#shared/contract/revisions.ts';

const params = z.object({ revisionId: id });
const checking = { who: 'dam', action: 'revision.decide', target: 'revision' } as const;

/** What a reviewer does on a revision before deciding. */
export const reviewRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/revisions/:revisionId/blind',
    access: { who: 'dam', action: 'dam.read', target: 'revision' },
    figures: 'none',
    params,
    reply: blindDto,
    handle: async ({ deps, params: { revisionId }, actor }) => ({
      view: await blindViewOf(deps.db.manager, revisionId, actor.id),
    }),
  }),
  defineRoute({
    method: 'post',
    path: '/revisions/:revisionId/point-places',
    access: checking,
    figures: 'none',
    params,
    reply: blindDto,
    handle: async ({ deps, params: { revisionId }, actor }) =>
      inTransaction(deps, async (tx) => {
        await createBlindReadingService(tx).showPlaces(revisionId, actor);
        return { view: await blindViewOf(tx.manager, revisionId, actor.id) };
      }),
  }),
  defineRoute({
    method: 'post',
    path: '/revisions/:revisionId/figure-openings',
    access: checking,
    figures: 'none',
    params,
    reply: revisionDto,
    status: 201,
    handle: async ({ deps, params: { revisionId }, actor, scope }) =>
      inTransaction(deps, async (tx) => {
        await createBlindReadingService(tx).openFigures(revisionId, actor);
        return revisionDetail(tx.manager, revisionId, actor, scope);
      }),
  }),
  defineRoute({
    method: 'post',
    path: '/revisions/:revisionId/blind-readings',
    access: checking,
    figures: 'none',
    params,
    body: blindReadingInput,
    reply: revisionDto,
    status: 201,
    handle: async ({ deps, params: { revisionId }, body, actor, scope }) =>
      inTransaction(deps, async (tx) => {
        await createBlindReadingService(tx).seal(revisionId, body, actor);
        return revisionDetail(tx.manager, revisionId, actor, scope);
      }),
  }),
  defineRoute({
    method: 'patch',
    path: '/revisions/:revisionId/check-draft',
    access: checking,
    params,
    body: checkDraftPatch,
    reply: checkDraftDto,
    handle: async ({ deps, params: { revisionId }, body, actor }) =>
      inTransaction(deps, (tx) => createCheckDraftService(tx).change(revisionId, body, actor)),
  }),
];
