import { type EntityManager, IsNull } from 'typeorm';
import { MailDigestEntity, OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { invalidInput, notFound } from '#server/errors/app-error.ts';
import type { MailChoiceDto, MailTiming } from '#shared/contract/mails.ts';
import { isTimeZone, nextDigestMoment } from './digest-moment.ts';
import { moveDigest } from './digest-queue.ts';
import { writeEvent } from './event-writer.ts';
import type { MailDeps } from './mail-service.ts';

const CHOSEN: Record<MailTiming, string> = {
  atOnce: 'chose to get each notice by mail at once',
  daily: 'chose to get notices by mail once a day',
  off: 'chose to get no notices by mail',
};

/** How notices come to a person. @throws AppError not-found */
export async function mailChoiceOf(manager: EntityManager, personId: string): Promise<MailChoiceDto> {
  const person = await manager.findOneBy(PersonEntity, { id: personId });
  if (!person) throw notFound();
  const digest = await manager.findOneBy(MailDigestEntity, { personId, doneAt: IsNull() });
  const held = digest ? await manager.countBy(OutboxMailEntity, { digestId: digest.id, state: 'held' }) : 0;
  return {
    timing: person.mailTiming,
    timeZone: person.timeZone,
    nextDigestAt: held > 0 ? (digest?.dueAt.toISOString() ?? null) : null,
    held,
  };
}

/**
 * Changes how notices come. What waits for a digest keeps to the new choice: it comes at once, by the new clock, or
 * not at all. Runs in a transaction of the caller.
 * @throws AppError invalid-input for a time zone that does not exist
 */
export async function chooseMailTiming(
  deps: MailDeps,
  personId: string,
  { timing, timeZone }: { timing: MailTiming; timeZone: string },
): Promise<MailChoiceDto> {
  if (!isTimeZone(timeZone))
    throw invalidInput([{ path: 'timeZone', message: 'There is no such time zone.' }]);
  await setTiming(deps, personId, { mailTiming: timing, timeZone }, CHOSEN[timing]);
  return mailChoiceOf(deps.manager, personId);
}

/** Stops the digests of a person who followed the link in one. What may never wait still comes. */
export async function stopDigests(deps: MailDeps, personId: string): Promise<void> {
  const person = await deps.manager.findOneBy(PersonEntity, { id: personId });
  // Somebody who meanwhile gets notices at once has no digests to stop; the link of an old digest changes nothing.
  if (person?.mailTiming !== 'daily') return;
  await setTiming(deps, personId, { mailTiming: 'off' }, 'stopped the daily digest by the link in it');
}

async function setTiming(
  deps: MailDeps,
  personId: string,
  change: Pick<PersonEntity, 'mailTiming'> & Partial<Pick<PersonEntity, 'timeZone'>>,
  text: string,
): Promise<void> {
  const { manager, clock } = deps;
  await manager.update(PersonEntity, { id: personId }, change);
  const { mailTiming, timeZone } = await manager.findOneByOrFail(PersonEntity, { id: personId });
  const now = clock.now();
  await moveDigest(deps, personId, mailTiming === 'daily' ? nextDigestMoment(now, timeZone) : now);
  await writeEvent(manager, { damId: null, personId, type: 'person.mailTimingChosen', text });
}
