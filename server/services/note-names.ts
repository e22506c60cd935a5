import { In } from 'typeorm';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { Actor } from '#server/http/route-record.ts';
import { namedInNoteMail } from '#server/mail/templates/note-mails.ts';
import { findMentions } from '#shared/text/mentions.ts';
import { sectionLabel } from '#shared/text/section-title.ts';
import { drawingTitle } from './drawing-title.ts';
import { inLockingOrder, queueMail } from './mail-service.ts';
import type { NetPlace } from './net-place.ts';
import { personState } from './person-state.ts';
import type { ServiceDeps } from './service-deps.ts';

type NamesDeps = Pick<ServiceDeps, 'manager' | 'jobs' | 'config' | 'clock'>;

/** Members of the dam who are named with @ in a text, each once. */
export async function namedIn({ manager }: NamesDeps, damId: string, text: string): Promise<PersonEntity[]> {
  if (!text.includes('@')) return [];
  const members = await manager.findBy(MembershipEntity, { damId });
  const people = await manager.findBy(PersonEntity, { id: In(members.map((each) => each.personId)) });
  const ids = new Set(findMentions(text, people).flatMap((mention) => mention.personIds));
  return people.filter(({ id }) => ids.has(id));
}

/** Mails those who were named, in the transaction of the note; nobody is mailed what they wrote themselves. */
export async function mailNamed(
  deps: NamesDeps,
  { dam, drawing, section, net }: NetPlace,
  note: { id: string; number: number },
  { people, text, actor }: { people: readonly PersonEntity[]; text: string; actor: Actor },
): Promise<void> {
  const letter = namedInNoteMail({
    author: actor.name,
    damName: dam.name,
    drawing: drawingTitle(drawing),
    section: sectionLabel(section),
    netName: net.name,
    noteNumber: note.number,
    text,
    url: `${deps.config.publicUrl}/nets/${net.id}#note-${note.id}`,
  });
  for (const person of inLockingOrder(people)) {
    if (person.id === actor.id || personState(person) !== 'active') continue;
    await queueMail(deps, { ...letter, personId: person.id, to: person.email, damId: dam.id });
  }
}
