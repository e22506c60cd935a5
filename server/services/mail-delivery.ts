import type { DataSource } from 'typeorm';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import type { Clock } from '#server/http/clock.ts';
import type { JobsPort } from '#server/jobs/jobs-port.ts';
import { type MailerPort, MailRefused } from '#server/mail/mailer-port.ts';
import { type DressingDeps, outgoingMail } from './mail-dressing.ts';

export interface DeliveryDeps extends DressingDeps {
  db: DataSource;
  jobs: JobsPort;
  mailer: MailerPort;
  clock: Clock;
  /** Whether links that work once are taken out of a mail once it is sent; kept where mails are read on a page. */
  forgetLinks: boolean;
}

/** Minutes to wait after the first, second, … failure: short for a hiccup, long for an outage over a weekend. */
export const RETRY_MINUTES = [0.5, 2, 10, 30, 120, 240, 480, 720, 1440] as const;
/** One more than there are waits. */
export const MAX_ATTEMPTS = RETRY_MINUTES.length + 1;
/** Longer than the mailer's own limits together; while it runs no other worker takes the mail. */
const LEASE_MS = 3 * 60_000;
const MAX_ERROR_LENGTH = 500;

/** A link's token, which is as good as a password while it lives. */
export const hideTokens = (text: string) => text.replace(/#[\w-]{43}(?![\w-])/g, '#(hidden)');

/**
 * Sends one mail of the outbox, if it is due and nobody else is sending it. Delivered at least once: after a crash
 * between sending and noting it the lease runs out and the same mail, under the same Message-ID, goes again.
 */
export async function deliverMail(deps: DeliveryDeps, mailId: string): Promise<void> {
  const mail = await lease(deps, mailId);
  if (!mail) {
    await wakeLater(deps, mailId);
    return;
  }
  try {
    await deps.mailer.send(await outgoingMail(deps, mail));
  } catch (error) {
    await noteFailure(deps, mail, error);
    return;
  }
  await noteSent(deps, mail);
}

/** Takes the mail for this worker and counts the attempt before it is made, so that a crash counts as one. */
async function lease({ db, clock }: DeliveryDeps, mailId: string): Promise<OutboxMailEntity | null> {
  const now = clock.now();
  const { affected } = await db
    .createQueryBuilder()
    .update(OutboxMailEntity)
    .set({ leaseUntil: new Date(now.getTime() + LEASE_MS), attempts: () => 'attempts + 1' })
    .where(`id = :mailId AND state = 'waiting' AND next_attempt_at <= :now`, { mailId, now })
    .andWhere('(lease_until IS NULL OR lease_until <= :now)', { now })
    .execute();
  return affected === 1 ? db.getRepository(OutboxMailEntity).findOneBy({ id: mailId }) : null;
}

/** Not due yet, or in the hands of a worker that may be dead: this mail has to be looked at again then. */
async function wakeLater({ db, jobs, clock }: DeliveryDeps, mailId: string): Promise<void> {
  const mail = await db.getRepository(OutboxMailEntity).findOneBy({ id: mailId });
  if (mail?.state !== 'waiting') return;
  await jobs.enqueue(db.manager, 'send-mail', mailId, secondsUntilDue(mail, clock.now()));
}

function secondsUntilDue({ nextAttemptAt, leaseUntil }: OutboxMailEntity, now: Date): number {
  const dueMs = Math.max(nextAttemptAt.getTime(), leaseUntil?.getTime() ?? 0);
  return Math.max(0, Math.ceil((dueMs - now.getTime()) / 1000));
}

async function noteSent({ db, clock, forgetLinks }: DeliveryDeps, mail: OutboxMailEntity): Promise<void> {
  const content = forgetLinks ? { text: hideTokens(mail.text), html: hideTokens(mail.html) } : {};
  await db
    .getRepository(OutboxMailEntity)
    .update(
      { id: mail.id },
      { state: 'sent', sentAt: clock.now(), leaseUntil: null, lastError: '', ...content },
    );
}

async function noteFailure(
  { db, jobs, clock }: DeliveryDeps,
  mail: OutboxMailEntity,
  error: unknown,
): Promise<void> {
  const lastError = (error instanceof Error ? error.message : String(error)).slice(0, MAX_ERROR_LENGTH);
  const minutes = error instanceof MailRefused ? undefined : RETRY_MINUTES[mail.attempts - 1];
  await db.transaction(async (manager) => {
    if (minutes === undefined) {
      await manager.update(
        OutboxMailEntity,
        { id: mail.id },
        { state: 'failed', lastError, leaseUntil: null },
      );
      return;
    }
    const nextAttemptAt = new Date(clock.now().getTime() + minutes * 60_000);
    await manager.update(OutboxMailEntity, { id: mail.id }, { nextAttemptAt, lastError, leaseUntil: null });
    await jobs.enqueue(manager, 'send-mail', mail.id, minutes * 60);
  });
}

/** Wakes a worker for every mail that waits, at start: whatever the last process had in hand or in mind goes on. */
export async function requeueWaitingMails({
  db,
  jobs,
  clock,
}: Pick<DeliveryDeps, 'db' | 'jobs' | 'clock'>): Promise<void> {
  const mails = await db.getRepository(OutboxMailEntity).find({
    where: { state: 'waiting' },
    order: { createdAt: 'ASC' },
  });
  for (const mail of mails)
    await jobs.enqueue(db.manager, 'send-mail', mail.id, secondsUntilDue(mail, clock.now()));
}
