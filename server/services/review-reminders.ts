import { type EntityManager, In, IsNull } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type { AppDeps } from '#server/app-deps.ts';
import { MembershipEntity } from '#server/entities/dam-entity.ts';
import { ReviewReminderEntity, type RevisionEntity } from '#server/entities/ledger-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { reviewReminderMail } from '#server/mail/templates/checking-mails.ts';
import { revisionFacts } from './checking-letters.ts';
import { queueMail } from './mail-service.ts';
import { placeOfNet, putAwayRefusal } from './net-place.ts';
import { personState } from './person-state.ts';
import { decisionFacts, openRevision } from './revision-queries.ts';
import type { ServiceDeps } from './service-deps.ts';

export const DAY_MS = 24 * 60 * 60 * 1000;
/** Reminders go out at 06:00 UTC, so that they lie in the mailbox in the morning in Europe and before it in America. */
const MORNING_MS = 6 * 60 * 60 * 1000;

type PlanDeps = Pick<ServiceDeps, 'manager' | 'jobs' | 'clock'>;
type ReminderDeps = Pick<ServiceDeps, 'manager' | 'jobs' | 'clock' | 'config'>;

/** When a revision that is due on a day is reminded of: on the day before, and once the day has passed. */
export function reminderMoments(dueOn: string): Array<{ kind: ReviewReminderEntity['kind']; at: Date }> {
  const day = Date.parse(dueOn);
  return [
    { kind: 'dayBefore', at: new Date(day - DAY_MS + MORNING_MS) },
    { kind: 'overdue', at: new Date(day + DAY_MS + MORNING_MS) },
  ];
}

/** Plans the reminders of a revision, in the transaction of its sending; moments that have passed are left out. */
export async function planReminders(
  { manager, jobs, clock }: PlanDeps,
  { revisionId, dueOn }: { revisionId: string; dueOn: string | null },
): Promise<void> {
  if (dueOn === null) return;
  const now = clock.now();
  for (const { kind, at } of reminderMoments(dueOn)) {
    if (at <= now) continue;
    const id = uuidv7();
    await manager.insert(ReviewReminderEntity, { id, revisionId, kind, at, doneAt: null });
    await jobs.enqueue(manager, 'remind-reviewers', id, secondsUntil(at, now));
  }
}

const secondsUntil = (at: Date, now: Date) => Math.max(0, Math.ceil((at.getTime() - now.getTime()) / 1000));

/**
 * Mails one reminder to the reviewers who have not decided, and notes that it is done: both or neither, so that nobody
 * is reminded twice. Runs in a transaction of the caller.
 */
export async function remindReviewers(deps: ReminderDeps, reminderId: string): Promise<void> {
  const { manager, jobs, clock } = deps;
  const reminder = await manager.findOne(ReviewReminderEntity, {
    where: { id: reminderId, doneAt: IsNull() },
    lock: { mode: 'pessimistic_write' },
  });
  if (!reminder) return;
  const now = clock.now();
  if (reminder.at > now) {
    await jobs.enqueue(manager, 'remind-reviewers', reminder.id, secondsUntil(reminder.at, now));
    return;
  }
  await manager.update(ReviewReminderEntity, { id: reminder.id }, { doneAt: now });
  await mailReminder(deps, reminder);
}

async function mailReminder(deps: ReminderDeps, { revisionId, kind }: ReviewReminderEntity): Promise<void> {
  const { manager, config } = deps;
  const { row, payload } = await openRevision(manager, revisionId);
  const letter = reviewReminderMail({
    ...revisionFacts(payload),
    kind,
    dueOn: payload.dueOn ?? '',
    sentBy: payload.sentBy.name,
    url: `${config.publicUrl}/revisions/${revisionId}`,
  });
  for (const { id, email } of await stillToDecide(manager, row))
    await queueMail(deps, { ...letter, personId: id, to: email, damId: payload.dam.id });
}

/** Reviewers of the revision whose decision is still wanted and who can still give it. */
async function stillToDecide(manager: EntityManager, row: RevisionEntity): Promise<PersonEntity[]> {
  const { state, supersededBy, decidedBy } = await decisionFacts(manager, row, row.reviewerId);
  const place = await placeOfNet(manager, row.netId);
  if (state !== 'waiting' || supersededBy !== null || putAwayRefusal(place)) return [];
  const ids = row.reviewerIds.filter((id) => !decidedBy.includes(id));
  const members = await manager.findBy(MembershipEntity, { damId: place.dam.id, personId: In(ids) });
  const reviewers = members.filter(({ roles }) => roles.includes('reviewer')).map(({ personId }) => personId);
  const people = await manager.findBy(PersonEntity, { id: In(reviewers) });
  return people.filter((person) => personState(person) === 'active');
}

/** Wakes a worker for every reminder that is not done, at start: the queue may have forgotten those far ahead. */
export async function requeueReminders({
  db,
  jobs,
  clock,
}: Pick<AppDeps, 'db' | 'jobs' | 'clock'>): Promise<void> {
  const waiting = await db.getRepository(ReviewReminderEntity).findBy({ doneAt: IsNull() });
  for (const { id, at } of waiting)
    await jobs.enqueue(db.manager, 'remind-reviewers', id, secondsUntil(at, clock.now()));
}
