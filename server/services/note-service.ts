import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type * as z from 'zod/mini';
import { NoteEntity, NoteEntryEntity } from '#server/entities/note-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Clock } from '#server/http/clock.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { LivePort } from '#server/live/live-port.ts';
import type { answerInput, NoteDto, noteInput } from '#shared/contract/notes.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { writeEvent } from './event-writer.ts';
import { lockNet } from './net-locks.ts';
import { type NetPlace, placeOfNet, refusePutAway } from './net-place.ts';
import { refuseTakenId } from './new-id.ts';
import { noteById } from './note-queries.ts';

/** What the activity calls each act on a note. */
const EVENT_OF = { wrote: 'written', answered: 'answered', closed: 'closed', reopened: 'reopened' } as const;

export interface NoteServiceDeps {
  manager: EntityManager;
  clock: Clock;
  live: LivePort;
}

/**
 * Notes on a net. Every change holds the net's lock, so that numbers and states follow one another. Runs in a
 * transaction of the caller. A repeat of a note or an answer whose reply was lost is answered and not written twice.
 */
export function createNoteService({ manager, clock, live }: NoteServiceDeps) {
  async function openPlace(netId: string): Promise<NetPlace> {
    await lockNet(manager, netId);
    const place = await placeOfNet(manager, netId);
    refusePutAway(place);
    return place;
  }

  async function loadNote(noteId: string): Promise<{ note: NoteEntity; place: NetPlace }> {
    const found = await manager.findOneBy(NoteEntity, { id: noteId });
    if (!found) throw notFound();
    const place = await openPlace(found.netId);
    // Read again under the lock: another person may have answered or closed it meanwhile.
    return { note: await manager.findOneByOrFail(NoteEntity, { id: noteId }), place };
  }

  async function announce(
    { net, section, drawing, dam }: NetPlace,
    note: { id: string; number: number },
    actor: Actor,
    verb: keyof typeof EVENT_OF,
  ): Promise<void> {
    const about = { damId: dam.id, drawingId: drawing.id, netId: net.id, personId: actor.id };
    const text = `${verb} note ${note.number} on ${sectionTitle(section.name)}, ${net.name}`;
    await writeEvent(manager, {
      ...about,
      type: `note.${EVENT_OF[verb]}`,
      text,
      detail: { noteId: note.id },
    });
    await live.publish(manager, { type: 'notes', damId: dam.id, netId: net.id });
  }

  async function nextNumber(netId: string): Promise<number> {
    return ((await manager.maximum(NoteEntity, 'number', { netId })) ?? 0) + 1;
  }

  async function addEntry(id: string, noteId: string, text: string, actor: Actor): Promise<void> {
    await manager.insert(NoteEntryEntity, {
      id,
      noteId,
      authorId: actor.id,
      text,
      createdAt: clock.now(),
    });
  }

  return {
    async write(netId: string, input: z.output<typeof noteInput>, actor: Actor): Promise<NoteDto> {
      const place = await openPlace(netId);
      const { id, anchor, text } = input;
      if (await manager.existsBy(NoteEntity, { id, netId, createdBy: actor.id }))
        return noteById(manager, id);
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
      await addEntry(uuidv7(), id, text, actor);
      await announce(place, { id, number }, actor, 'wrote');
      return noteById(manager, id);
    },

    /** Adds to a note: another person answers it, its author opens it again. */
    async answer(noteId: string, input: z.output<typeof answerInput>, actor: Actor): Promise<NoteDto> {
      const { note, place } = await loadNote(noteId);
      const { id, text } = input;
      const isRepeat = await manager.existsBy(NoteEntryEntity, { id, noteId, authorId: actor.id });
      if (isRepeat) return noteById(manager, noteId);
      await refuseTakenId(manager, NoteEntryEntity, id, 'answer');
      if (note.state === 'closed')
        throw conflict(
          'conflict',
          'The note is closed',
          'This note has been closed. Reopen it to add to it.',
        );
      await addEntry(id, noteId, text, actor);
      const state = note.createdBy === actor.id ? 'open' : 'answered';
      await manager.update(NoteEntity, { id: noteId }, { state });
      await announce(place, note, actor, 'answered');
      return noteById(manager, noteId);
    },

    async close(noteId: string, actor: Actor): Promise<NoteDto> {
      const { note, place } = await loadNote(noteId);
      if (note.state !== 'closed') {
        const closing = { state: 'closed' as const, closedBy: actor.id, closedAt: clock.now() };
        await manager.update(NoteEntity, { id: noteId }, closing);
        await announce(place, note, actor, 'closed');
      }
      return noteById(manager, noteId);
    },

    async reopen(noteId: string, actor: Actor): Promise<NoteDto> {
      const { note, place } = await loadNote(noteId);
      if (note.state === 'closed') {
        const opening = { state: 'open' as const, closedBy: null, closedAt: null };
        await manager.update(NoteEntity, { id: noteId }, opening);
        await announce(place, note, actor, 'reopened');
      }
      return noteById(manager, noteId);
    },
  };
}
