import { IsNull } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import type { AppDeps } from '#server/app-deps.ts';
import { MailDigestEntity } from '#server/entities/mail-entity.ts';
import type { PersonEntity } from '#server/entities/person-entity.ts';
import { nextDigestMoment } from './digest-moment.ts';
import type { ServiceDeps } from './service-deps.ts';

type QueueDeps = Pick<ServiceDeps, 'manager' | 'jobs' | 'clock'>;

export const secondsUntil = (at: Date, now: Date) =>
  Math.max(0, Math.ceil((at.getTime() - now.getTime()) / 1000));

/**
 * The digest that gathers a person's notices now, begun when there is none. Taking it waits for a worker that is just
 * making it, and then begins the next one.
 */
export async function openDigestOf(
  { manager, jobs, clock }: QueueDeps,
  { id: personId, timeZone }: Pick<PersonEntity, 'id' | 'timeZone'>,
): Promise<string> {
  const now = clock.now();
  const dueAt = nextDigestMoment(now, timeZone);
  const [row]: Array<{ id: string; due_at: Date }> = await manager.query(
    `INSERT INTO mail_digest (id, person_id, due_at) VALUES ($1, $2, $3)
      ON CONFLICT (person_id) WHERE done_at IS NULL DO UPDATE SET person_id = excluded.person_id
      RETURNING id, due_at`,
    [uuidv7(), personId, dueAt],
  );
  if (!row) throw new Error(`No digest could be begun for ${personId}.`);
  await jobs.enqueue(manager, 'send-digest', row.id, secondsUntil(row.due_at, now));
  return row.id;
}

/** Moves a person's open digest to another moment, when their choice changes. */
export async function moveDigest(
  { manager, jobs, clock }: QueueDeps,
  personId: string,
  dueAt: Date,
): Promise<void> {
  const open = await manager.findOne(MailDigestEntity, {
    where: { personId, doneAt: IsNull() },
    lock: { mode: 'pessimistic_write' },
  });
  if (!open) return;
  await manager.update(MailDigestEntity, { id: open.id }, { dueAt });
  await jobs.enqueue(manager, 'send-digest', open.id, secondsUntil(dueAt, clock.now()));
}

/** Wakes a worker for every digest that is not made, at start: the queue may have forgotten. */
export async function requeueDigests({
  db,
  jobs,
  clock,
}: Pick<AppDeps, 'db' | 'jobs' | 'clock'>): Promise<void> {
  const open = await db.getRepository(MailDigestEntity).findBy({ doneAt: IsNull() });
  for (const { id, dueAt } of open)
    await jobs.enqueue(db.manager, 'send-digest', id, secondsUntil(dueAt, clock.now()));
}
