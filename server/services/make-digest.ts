import { type EntityManager, In, IsNull } from 'typeorm';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { MailDigestEntity, OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { digestMail } from '#server/mail/templates/digest-mail.ts';
import { digestStopPage, digestStopToken } from './digest-link.ts';
import { dayInWords } from './digest-moment.ts';
import { secondsUntil } from './digest-queue.ts';
import { type MailDeps, queueMail } from './mail-service.ts';
import { personState } from './person-state.ts';

/**
 * Makes a digest that is due: one mail of all that was held for it, and the note that each of them is told, both or
 * neither, so that nothing is told twice or lost. Runs in a transaction of the caller.
 */
export async function makeDigest(deps: MailDeps, digestId: string): Promise<void> {
  const { manager, jobs, clock } = deps;
  const digest = await manager.findOne(MailDigestEntity, {
    where: { id: digestId, doneAt: IsNull() },
    lock: { mode: 'pessimistic_write' },
  });
  if (!digest) return;
  const now = clock.now();
  if (digest.dueAt > now) {
    await jobs.enqueue(manager, 'send-digest', digestId, secondsUntil(digest.dueAt, now));
    return;
  }
  await manager.update(MailDigestEntity, { id: digestId }, { doneAt: now });
  const reader = await manager.findOneByOrFail(PersonEntity, { id: digest.personId });
  const { told, dropped } = await sortHeld(manager, digestId, reader);
  await note(manager, dropped, 'dropped');
  await note(manager, told, 'inDigest');
  if (told.length > 0) await write(deps, digestId, reader, told);
}

/** Held notices, parted by whether the person still belongs to what they tell of and still wants them. */
async function sortHeld(manager: EntityManager, digestId: string, reader: PersonEntity) {
  const held = await manager.find(OutboxMailEntity, {
    where: { digestId, state: 'held' },
    order: { createdAt: 'ASC', id: 'ASC' },
    lock: { mode: 'pessimistic_write' },
  });
  const memberships = await manager.findBy(MembershipEntity, { personId: reader.id });
  const dams = new Set(memberships.map(({ damId }) => damId));
  const wanted = personState(reader) === 'active' && reader.mailTiming !== 'off';
  const isTold = ({ damId }: OutboxMailEntity) => wanted && (damId === null || dams.has(damId));
  return { told: held.filter(isTold), dropped: held.filter((mail) => !isTold(mail)) };
}

async function note(
  manager: EntityManager,
  mails: readonly OutboxMailEntity[],
  state: 'inDigest' | 'dropped',
): Promise<void> {
  const ids = mails.map(({ id }) => id);
  if (ids.length > 0) await manager.update(OutboxMailEntity, { id: In(ids) }, { state });
}

async function write(
  deps: MailDeps,
  digestId: string,
  reader: PersonEntity,
  told: readonly OutboxMailEntity[],
): Promise<void> {
  const letter = digestMail({
    day: dayInWords(deps.clock.now(), reader.timeZone),
    items: told.map(({ subject, brief, link }) => ({ title: subject, text: brief, url: link })),
    stopUrl: digestStopPage(deps.config, digestStopToken(deps.config, reader.id)),
  });
  await queueMail(deps, { ...letter, personId: reader.id, to: reader.email, digestId });
}
