import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { NoteEntity, NoteEntryEarlierEntity, NoteEntryEntity } from '#server/entities/note-entity.ts';
import { AppError, conflict, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { NOTE_EDIT_MINUTES } from '#shared/contract/limits.ts';
import type { answerInput, entryPatch, NoteDto, noteInput } from '#shared/contract/notes.ts';
import type { NetPlace } from './net-place.ts';
import { refuseTakenId } from './new-id.ts';
import { createNoteChanges } from './note-changes.ts';
import { attachFiles } from './note-file-service.ts';
import { mailNamed, namedIn } from './note-names.ts';
import { noteById } from './note-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

export type NoteServiceDeps = Pick<ServiceDeps, 'manager' | 'clock' | 'live' | 'jobs' | 'config'>;

interface NewEntry {
  id: string;
  text: string;
  fileIds?: string[] | undefined;
}

/**
 * Notes on a net. Every change holds the net's lock, so that numbers and states follow one another. Runs in a
 * transaction of the caller. A repeat of a note or an answer whose reply was lost is answered and not written twice.
 */
export function createNoteService(deps: NoteServiceDeps) {
  const { manager, clock } = deps;
  const { openPlace, openNote, announce } = createNoteChanges(deps);

  async function nextNumber(netId: string): Promise<number> {
    return ((await manager.maximum(NoteEntity, 'number', { netId })) ?? 0) + 1;
  }

  async function addEntry(
    place: NetPlace,
    note: { id: string; number: number },
    { id, text, fileIds = [] }: NewEntry,
    actor: Actor,
  ): Promise<void> {
    const people = await namedIn(deps, place.dam.id, text);
    await manager.insert(NoteEntryEntity, {
      id,
      noteId: note.id,
      authorId: actor.id,
      text,
      createdAt: clock.now(),
      named: people.map((person) => person.id),
    });
    await attachFiles(manager, { id, netId: place.net.id }, fileIds, actor);
    await mailNamed(deps, place, note, { people, text, actor });
  }

  async function setMustAnswer(noteId: string, wanted: boolean, actor: Actor): Promise<NoteDto> {
    const { note, place } = await openNote(noteId);
    if ((note.mustAnswerAt !== null) === wanted) return noteById(manager, noteId, actor.id);
    if (wanted && note.state === 'closed') throw closedAlready('Reopen it to ask for an answer.');
    const mark = wanted
      ? { mustAnswerBy: actor.id, mustAnswerAt: clock.now() }
      : { mustAnswerBy: null, mustAnswerAt: null };
    await manager.update(NoteEntity, { id: noteId }, mark);
    const verb = wanted
      ? 'asked for an answer before acceptance to'
      : 'no longer asks for an answer before acceptance to';
    await announce(place, note, actor, verb);
    return noteById(manager, noteId, actor.id);
  }

  return {
    async write(netId: string, input: z.output<typeof noteInput>, actor: Actor): Promise<NoteDto> {
      const place = await openPlace(netId);
      const { id, anchor, text, fileIds } = input;
      if (await manager.existsBy(NoteEntity, { id, netId, createdBy: actor.id }))
        return noteById(manager, id, actor.id);
      await refuseTakenId(manager, NoteEntity, id, 'note');
      const number = await nextNumber(netId);
      await manager.insert(NoteEntity, {
        id,
        netId,
        number,
        anchor,
        createdBy: actor.id,
        createdAt: clock.now(),
      });
      await addEntry(place, { id, number }, { id: uuidv7(), text, fileIds }, actor);
      await announce(place, { id, number }, actor, 'wrote');
      return noteById(manager, id, actor.id);
    },

    /** Adds to a note: another person answers it, its author opens it again. */
    async answer(noteId: string, input: z.output<typeof answerInput>, actor: Actor): Promise<NoteDto> {
      const { note, place } = await openNote(noteId);
      const { id } = input;
      const isRepeat = await manager.existsBy(NoteEntryEntity, { id, noteId, authorId: actor.id });
      if (isRepeat) return noteById(manager, noteId, actor.id);
      await refuseTakenId(manager, NoteEntryEntity, id, 'answer');
      if (note.state === 'closed') throw closedAlready('Reopen it to add to it.');
      await addEntry(place, note, input, actor);
      const state = note.createdBy === actor.id ? 'open' : 'answered';
      await manager.update(NoteEntity, { id: noteId }, { state });
      await announce(place, note, actor, 'answered');
      return noteById(manager, noteId, actor.id);
    },

    /** Changes what an entry says, by its author and for a while; what it said before is kept. */
    async changeEntry(
      noteId: string,
      entryId: string,
      { text }: z.output<typeof entryPatch>,
      actor: Actor,
    ): Promise<NoteDto> {
      const { note, place } = await openNote(noteId);
      const entry = await manager.findOneBy(NoteEntryEntity, { id: entryId, noteId });
      if (!entry) throw notFound();
      if (entry.text === text) return noteById(manager, noteId, actor.id);
      refuseLateChange(entry, actor, clock.now());
      if (note.state === 'closed') throw closedAlready('Reopen it to change it.');
      const people = await namedIn(deps, place.dam.id, text);
      const earlier = { id: uuidv7(), entryId, text: entry.text, replacedAt: clock.now() };
      await manager.insert(NoteEntryEarlierEntity, earlier);
      const named = people.map((person) => person.id);
      await manager.update(NoteEntryEntity, { id: entryId }, { text, named, editedAt: clock.now() });
      // Who was named before has had the mail.
      const newly = people.filter((person) => !entry.named.includes(person.id));
      await mailNamed(deps, place, note, { people: newly, text, actor });
      await announce(place, note, actor, 'changed');
      return noteById(manager, noteId, actor.id);
    },

    /** @throws AppError conflict while an answer is asked for, unless a reviewer closes it */
    async close(noteId: string, actor: Actor, isReviewer: boolean): Promise<NoteDto> {
      const { note, place } = await openNote(noteId);
      if (note.state === 'open' && note.mustAnswerAt && !isReviewer) throw unanswered();
      if (note.state !== 'closed') {
        const closing = { state: 'closed' as const, closedBy: actor.id, closedAt: clock.now() };
        await manager.update(NoteEntity, { id: noteId }, closing);
        await announce(place, note, actor, 'closed');
      }
      return noteById(manager, noteId, actor.id);
    },

    async reopen(noteId: string, actor: Actor): Promise<NoteDto> {
      const { note, place } = await openNote(noteId);
      if (note.state === 'closed') {
        const opening = { state: 'open' as const, closedBy: null, closedAt: null };
        await manager.update(NoteEntity, { id: noteId }, opening);
        await announce(place, note, actor, 'reopened');
      }
      return noteById(manager, noteId, actor.id);
    },

    mustAnswer: (noteId: string, actor: Actor) => setMustAnswer(noteId, true, actor),
    needNotAnswer: (noteId: string, actor: Actor) => setMustAnswer(noteId, false, actor),
  };
}

const MINUTE_MS = 60_000;

function refuseLateChange(entry: NoteEntryEntity, actor: Actor, now: Date): void {
  if (entry.authorId !== actor.id)
    throw new AppError('forbidden', 403, 'This is not yours to change', 'Only its author changes a text.');
  if (now.getTime() - entry.createdAt.getTime() > NOTE_EDIT_MINUTES * MINUTE_MS)
    throw conflict(
      'conflict',
      'It is too late to change this',
      `A text can be changed for ${NOTE_EDIT_MINUTES} minutes. Add an answer that puts it right.`,
    );
}

const closedAlready = (advice: string) =>
  conflict('conflict', 'The note is closed', `This note has been closed. ${advice}`);

const unanswered = () =>
  conflict(
    'conflict',
    'The note must be answered first',
    'A reviewer wants this note answered before acceptance. Answer it, or let a reviewer close it.',
  );
