import { NoteEntity } from '#server/entities/note-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { writeEvent } from './event-writer.ts';
import { lockNet } from './net-locks.ts';
import { type NetPlace, placeOfNet, refusePutAway } from './net-place.ts';
import type { ServiceDeps } from './service-deps.ts';

/** What the activity calls each act on a note. */
const EVENT_OF = {
  wrote: 'written',
  answered: 'answered',
  closed: 'closed',
  reopened: 'reopened',
  changed: 'changed',
  'asked for an answer before acceptance to': 'mustAnswer',
  'no longer asks for an answer before acceptance to': 'needNotAnswer',
} as const;

/** What every change of a note begins and ends with: the net's lock, the event, and telling others. */
export function createNoteChanges({ manager, live }: Pick<ServiceDeps, 'manager' | 'live'>) {
  async function openPlace(netId: string): Promise<NetPlace> {
    await lockNet(manager, netId);
    const place = await placeOfNet(manager, netId);
    refusePutAway(place);
    return place;
  }

  async function openNote(noteId: string): Promise<{ note: NoteEntity; place: NetPlace }> {
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
    await writeEvent(manager, {
      damId: dam.id,
      drawingId: drawing.id,
      netId: net.id,
      personId: actor.id,
      type: `note.${EVENT_OF[verb]}`,
      text: `${verb} note ${note.number} on ${sectionTitle(section.name)}, ${net.name}`,
      detail: { noteId: note.id },
    });
    await live.publish(manager, { type: 'notes', damId: dam.id, netId: net.id });
  }

  return { openPlace, openNote, announce };
}
