import { NoteEntity, NoteEntryEntity } from '#server/entities/note-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { noteById } from './note-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

/**
 * Notes how many entries of a note a person has seen, never fewer than before and never more than there are, and
 * tells the person's other windows.
 */
export async function markRead(
  { manager, live }: Pick<ServiceDeps, 'manager' | 'live'>,
  noteId: string,
  entries: number,
  actor: Actor,
): Promise<NoteDto> {
  const note = await manager.findOneBy(NoteEntity, { id: noteId });
  if (!note) throw notFound();
  const seen = Math.min(entries, await manager.countBy(NoteEntryEntity, { noteId }));
  const changed: unknown[] = await manager.query(
    `INSERT INTO note_read (note_id, person_id, entries) VALUES ($1, $2, $3)
      ON CONFLICT (note_id, person_id) DO UPDATE SET entries = excluded.entries
        WHERE note_read.entries < excluded.entries
      RETURNING entries`,
    [noteId, actor.id, seen],
  );
  if (changed.length > 0)
    await live.publish(manager, { type: 'notesRead', personId: actor.id, netId: note.netId });
  return noteById(manager, noteId, actor.id);
}
