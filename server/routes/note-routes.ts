import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { notesOfNet } from '#server/services/note-queries.ts';
import { createNoteService } from '#server/services/note-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import { answerInput, noteDto, noteInput, noteListDto } from '#shared/contract/notes.ts';

const netParams = z.object({ netId: id });
const noteParams = z.object({ noteId: id });
const onNote = { who: 'dam', action: 'note.write', target: 'note' } as const;

export const noteRoutes: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/nets/:netId/notes',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    params: netParams,
    reply: noteListDto,
    handle: async ({ deps, params }) => ({ items: await notesOfNet(deps.db.manager, params.netId) }),
  }),
  defineRoute({
    method: 'post',
    path: '/nets/:netId/notes',
    access: { who: 'dam', action: 'note.write', target: 'net' },
    params: netParams,
    body: noteInput,
    reply: noteDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).write(params.netId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/notes/:noteId/answers',
    access: onNote,
    params: noteParams,
    body: answerInput,
    reply: noteDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).answer(params.noteId, body, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/notes/:noteId/close',
    access: onNote,
    params: noteParams,
    reply: noteDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).close(params.noteId, actor)),
  }),
  defineRoute({
    method: 'post',
    path: '/notes/:noteId/reopen',
    access: onNote,
    params: noteParams,
    reply: noteDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).reopen(params.noteId, actor)),
  }),
];
