import { type EntityManager, In } from 'typeorm';
import {
  NoteEntity,
  NoteEntryEarlierEntity,
  NoteEntryEntity,
  NoteFileEntity,
  NoteReadEntity,
} from '#server/entities/note-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { NoteDto, NoteEntryDto, NoteFileDto } from '#shared/contract/notes.ts';
import { personRefs } from './person-refs.ts';

/**
 * The notes of a net by number, each with its answers in order; what is unread is so for the reader, and nothing is
 * for nobody.
 */
export async function notesOfNet(
  manager: EntityManager,
  netId: string,
  readerId: string | null = null,
): Promise<NoteDto[]> {
  const notes = await manager.find(NoteEntity, { where: { netId }, order: { number: 'ASC' } });
  return present(manager, notes, readerId);
}

/** One note with its answers. @throws AppError not-found */
export async function noteById(manager: EntityManager, noteId: string, readerId: string): Promise<NoteDto> {
  const [note] = await present(manager, await manager.findBy(NoteEntity, { id: noteId }), readerId);
  if (!note) throw notFound();
  return note;
}

/** What an entry of a note said before it was changed, the newest first. @throws AppError not-found */
export async function earlierTexts(manager: EntityManager, noteId: string, entryId: string) {
  if (!(await manager.existsBy(NoteEntryEntity, { id: entryId, noteId }))) throw notFound();
  const rows = await manager.find(NoteEntryEarlierEntity, {
    where: { entryId },
    order: { replacedAt: 'DESC', id: 'DESC' },
  });
  return rows.map(({ id, text, replacedAt }) => ({ id, text, replacedAt: replacedAt.toISOString() }));
}

export const presentFile = (file: NoteFileEntity): NoteFileDto => ({
  id: file.id,
  fileName: file.fileName,
  mediaType: file.mediaType,
  byteSize: Number(file.byteSize),
});

/** What belongs to the notes presented, looked up once for all of them. */
interface Known {
  people: ReadonlyMap<string, PersonRef>;
  files: readonly NoteFileEntity[];
  /** Entries read of each note; null where nobody reads. */
  read: ReadonlyMap<string, number> | null;
  readerId: string | null;
}

async function present(
  manager: EntityManager,
  notes: NoteEntity[],
  readerId: string | null,
): Promise<NoteDto[]> {
  if (notes.length === 0) return [];
  const noteIds = notes.map((note) => note.id);
  const entries = await manager.find(NoteEntryEntity, {
    where: { noteId: In(noteIds) },
    order: { createdAt: 'ASC', id: 'ASC' },
  });
  const files = await manager.find(NoteFileEntity, {
    where: { entryId: In(entries.map((entry) => entry.id)) },
    order: { uploadedAt: 'ASC', id: 'ASC' },
  });
  const people = await personRefs(manager, [
    ...entries.flatMap((entry) => [entry.authorId, ...entry.named]),
    ...notes.flatMap((note) => [note.closedBy, note.mustAnswerBy]),
  ]);
  const read = readerId === null ? null : await entriesRead(manager, noteIds, readerId);
  const known = { people, files, read, readerId };
  return notes.map((note) =>
    presentNote(
      note,
      entries.filter((entry) => entry.noteId === note.id),
      known,
    ),
  );
}

async function entriesRead(manager: EntityManager, noteIds: string[], personId: string) {
  const rows = await manager.findBy(NoteReadEntity, { noteId: In(noteIds), personId });
  return new Map(rows.map((row) => [row.noteId, row.entries]));
}

function presentNote(note: NoteEntity, entries: NoteEntryEntity[], known: Known): NoteDto {
  const person = (id: string): PersonRef => known.people.get(id) ?? { id, name: '' };
  const byWhom = (id: string | null | undefined, at: Date | null | undefined) =>
    id && at ? { by: person(id), at: at.toISOString() } : null;
  const answer =
    note.state === 'open' ? null : entries.findLast((entry) => entry.authorId !== note.createdBy);
  const seen = known.read?.get(note.id) ?? 0;
  return {
    id: note.id,
    netId: note.netId,
    number: note.number,
    anchor: note.anchor,
    state: note.state,
    createdAt: note.createdAt.toISOString(),
    answered: byWhom(answer?.authorId, answer?.createdAt),
    closedBy: note.closedBy === null ? null : person(note.closedBy),
    closedAt: note.closedAt?.toISOString() ?? null,
    mustAnswer: byWhom(note.mustAnswerBy, note.mustAnswerAt),
    unread: known.read ? entries.slice(seen).filter((entry) => entry.authorId !== known.readerId).length : 0,
    entries: entries.map((entry) => presentEntry(entry, known.files, person)),
  };
}

function presentEntry(
  entry: NoteEntryEntity,
  files: readonly NoteFileEntity[],
  person: (id: string) => PersonRef,
): NoteEntryDto {
  return {
    id: entry.id,
    author: person(entry.authorId),
    text: entry.text,
    at: entry.createdAt.toISOString(),
    editedAt: entry.editedAt?.toISOString() ?? null,
    named: entry.named.map(person),
    files: files.filter((file) => file.entryId === entry.id).map(presentFile),
  };
}
