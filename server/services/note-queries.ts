import { type EntityManager, In } from 'typeorm';
import { NoteEntity, NoteEntryEntity } from '#server/entities/note-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { personRefs } from './person-refs.ts';

/** The notes of a net by number, each with its answers in order. */
export async function notesOfNet(manager: EntityManager, netId: string): Promise<NoteDto[]> {
  return present(manager, await manager.find(NoteEntity, { where: { netId }, order: { number: 'ASC' } }));
}

/** One note with its answers. @throws AppError not-found */
export async function noteById(manager: EntityManager, noteId: string): Promise<NoteDto> {
  const [note] = await present(manager, await manager.findBy(NoteEntity, { id: noteId }));
  if (!note) throw notFound();
  return note;
}

async function present(manager: EntityManager, notes: NoteEntity[]): Promise<NoteDto[]> {
  if (notes.length === 0) return [];
  const entries = await manager.find(NoteEntryEntity, {
    where: { noteId: In(notes.map((note) => note.id)) },
    order: { createdAt: 'ASC', id: 'ASC' },
  });
  const people = await personRefs(manager, [
    ...entries.map((entry) => entry.authorId),
    ...notes.map((note) => note.closedBy),
  ]);
  return notes.map((note) =>
    presentNote(
      note,
      entries.filter((entry) => entry.noteId === note.id),
      people,
    ),
  );
}

function presentNote(
  note: NoteEntity,
  entries: NoteEntryEntity[],
  people: ReadonlyMap<string, PersonRef>,
): NoteDto {
  const person = (id: string): PersonRef => people.get(id) ?? { id, name: '' };
  return {
    id: note.id,
    netId: note.netId,
    number: note.number,
    anchor: note.anchor,
    state: note.state,
    createdAt: note.createdAt.toISOString(),
    closedBy: note.closedBy === null ? null : person(note.closedBy),
    closedAt: note.closedAt?.toISOString() ?? null,
    entries: entries.map(({ id, authorId, text, createdAt }) => ({
      id,
      author: person(authorId),
      text,
      at: createdAt.toISOString(),
    })),
  };
}
