import * as z from 'zod/mini';
import { defineRoute, type RouteRecord } from '#server/http/route-record.ts';
import { sendStored } from '#server/http/send-stored.ts';
import { withReceivedFile } from '#server/http/upload.ts';
import { noteFileOf, takeNoteFile } from '#server/services/note-file-service.ts';
import { earlierTexts, notesOfNet } from '#server/services/note-queries.ts';
import { markRead } from '#server/services/note-read-service.ts';
import { createNoteService } from '#server/services/note-service.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { id } from '#shared/contract/common.ts';
import {
  answerInput,
  earlierTextsDto,
  entryPatch,
  noteDto,
  noteFileDto,
  noteInput,
  noteListDto,
  readInput,
} from '#shared/contract/notes.ts';

const netParams = z.object({ netId: id });
const noteParams = z.object({ noteId: id });
const entryParams = z.object({ noteId: id, entryId: id });
const onNote = <const A extends 'dam.read' | 'note.write' | 'revision.decide'>(action: A) =>
  ({ who: 'dam', action, target: 'note' }) as const;

/** Pictures that every browser shows without running anything in them. */
const SHOWN_INLINE = ['image/png', 'image/jpeg', 'image/webp'];

const ofNet: RouteRecord[] = [
  defineRoute({
    method: 'get',
    path: '/nets/:netId/notes',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    params: netParams,
    reply: noteListDto,
    handle: async ({ deps, params, actor }) => ({
      items: await notesOfNet(deps.db.manager, params.netId, actor.id),
    }),
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
];

const files: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/nets/:netId/note-files',
    access: { who: 'dam', action: 'note.write', target: 'net' },
    params: netParams,
    query: z.object({ id }),
    reply: noteFileDto,
    status: 201,
    handle: async ({ deps, params, query, actor, req, res }) =>
      withReceivedFile(deps, req, res, (file) =>
        inTransaction(deps, (tx) => takeNoteFile(tx, params.netId, query.id, file, actor)),
      ),
  }),
  defineRoute({
    method: 'get',
    path: '/nets/:netId/note-files/:fileId',
    access: { who: 'dam', action: 'dam.read', target: 'net' },
    params: z.object({ netId: id, fileId: id }),
    handle: async ({ deps, params, actor, req, res }) => {
      const file = await noteFileOf(deps.db.manager, params.netId, params.fileId, actor.id);
      // A picture may stand in the page; everything else only leaves as a download, and neither is a page itself.
      if (!SHOWN_INLINE.includes(file.mediaType)) res.attachment(file.fileName);
      res.setHeader('Content-Type', file.mediaType);
      res.setHeader('Content-Security-Policy', "sandbox; default-src 'none'");
      res.setHeader('X-Content-Type-Options', 'nosniff');
      await sendStored(deps.storage, file.key, req, res);
    },
  }),
];

const entries: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/notes/:noteId/answers',
    access: onNote('note.write'),
    params: noteParams,
    body: answerInput,
    reply: noteDto,
    status: 201,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).answer(params.noteId, body, actor)),
  }),
  defineRoute({
    method: 'patch',
    path: '/notes/:noteId/entries/:entryId',
    access: onNote('note.write'),
    params: entryParams,
    body: entryPatch,
    reply: noteDto,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) =>
        createNoteService(tx).changeEntry(params.noteId, params.entryId, body, actor),
      ),
  }),
  defineRoute({
    method: 'get',
    path: '/notes/:noteId/entries/:entryId/earlier',
    access: onNote('dam.read'),
    params: entryParams,
    reply: earlierTextsDto,
    handle: async ({ deps, params }) => ({
      items: await earlierTexts(deps.db.manager, params.noteId, params.entryId),
    }),
  }),
  defineRoute({
    method: 'put',
    path: '/notes/:noteId/read',
    access: onNote('dam.read'),
    params: noteParams,
    body: readInput,
    reply: noteDto,
    handle: async ({ deps, params, body, actor }) =>
      inTransaction(deps, (tx) => markRead(tx, params.noteId, body.entries, actor)),
  }),
];

const states: RouteRecord[] = [
  defineRoute({
    method: 'post',
    path: '/notes/:noteId/close',
    access: onNote('note.write'),
    params: noteParams,
    reply: noteDto,
    handle: async ({ deps, params, actor, scope }) =>
      inTransaction(deps, (tx) =>
        createNoteService(tx).close(params.noteId, actor, scope.roles.includes('reviewer')),
      ),
  }),
  defineRoute({
    method: 'post',
    path: '/notes/:noteId/reopen',
    access: onNote('note.write'),
    params: noteParams,
    reply: noteDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).reopen(params.noteId, actor)),
  }),
  defineRoute({
    method: 'put',
    path: '/notes/:noteId/must-answer',
    access: onNote('revision.decide'),
    params: noteParams,
    reply: noteDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).mustAnswer(params.noteId, actor)),
  }),
  defineRoute({
    method: 'delete',
    path: '/notes/:noteId/must-answer',
    access: onNote('revision.decide'),
    params: noteParams,
    reply: noteDto,
    handle: async ({ deps, params, actor }) =>
      inTransaction(deps, (tx) => createNoteService(tx).needNotAnswer(params.noteId, actor)),
  }),
];

export const noteRoutes: RouteRecord[] = [...ofNet, ...files, ...entries, ...states];
