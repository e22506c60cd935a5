import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { createCarryAcrossService } from '#server/services/carry-across-service.ts';
import { createSectionService } from '#server/services/section-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { carriedSectionDto, carriedSectionInput } from '#shared/contract/carry-across.ts';
import { id } from '#shared/contract/common.ts';
import { sectionDto } from '#shared/contract/drawings.ts';
import { sectionInput, sectionPatch } from '#shared/contract/nets.ts';

const sectionParams = z.object({ sectionId: id });
const onSection = { who: 'dam', action: 'section.edit', target: 'section' } as const;

export const sectionRoutes: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/sheets/:sheetId/sections',
    access: { who: 'dam', action: 'section.edit', target: 'sheet' },
    params: z.object({ sheetId: id }),
    body: sectionInput,
    reply: sectionDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createSectionService(tx).create(params.sheetId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/sheets/:sheetId/carried-sections',
    access: { who: 'dam', action: 'section.edit', target: 'sheet' },
    params: z.object({ sheetId: id }),
    body: carriedSectionInput,
    reply: carriedSectionDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createCarryAcrossService(tx).carry(params.sheetId, body, actor)),
  }),
  defineRoute({
    method: 'patch',
    path: '/sections/:sectionId',
    access: onSection,
    params: sectionParams,
    body: sectionPatch,
    reply: sectionDto,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createSectionService(tx).change(params.sectionId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/sections/:sectionId/archive',
    access: onSection,
    params: sectionParams,
    reply: sectionDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createSectionService(tx).archive(params.sectionId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/sections/:sectionId/restore',
    access: onSection,
    params: sectionParams,
    reply: sectionDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createSectionService(tx).restore(params.sectionId, actor)),
  }),
];
