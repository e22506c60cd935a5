import { v7 as uuidv7 } from 'uuid';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Letter } from '#server/mail/templates/letter.ts';
import { mailOnWriting, mayWait } from '#server/policies/mail-policy.ts';
import type { MailTiming } from '#shared/contract/mails.ts';
import { openDigestOf } from './digest-queue.ts';
import type { ServiceDeps } from './service-deps.ts';

export interface MailInput extends Letter {
  /** The person it is for, who may read it in the demo; null for an address without a person. */
  personId: string | null;
  to: string;
  /** The dam it tells of. */
  damId?: string;
  /** The revision whose section it shows as a picture. */
  revisionId?: string;
  /** The digest that this mail is. */
  digestId?: string;
}

export type MailDeps = Pick<ServiceDeps, 'manager' | 'jobs' | 'config' | 'clock'>;

const newMessageId = (config: MailDeps['config']) => `<${uuidv7()}@${new URL(config.publicUrl).hostname}>`;

/**
 * Writes a mail to the outbox and wakes the worker, both in the caller's transaction: a mail that is announced is
 * sent, and nothing is sent for a change that was taken back. A notice that may wait is held for the reader's digest
 * where they asked for one, and kept unsent where they want none.
 */
export async function queueMail(deps: MailDeps, mail: MailInput): Promise<string> {
  const { manager, jobs, config, clock } = deps;
  const id = uuidv7();
  const { state, digestId } = await onWriting(deps, mail);
  await manager.insert(OutboxMailEntity, {
    id,
    messageId: newMessageId(config),
    personId: mail.personId,
    toAddress: mail.to,
    kind: mail.kind,
    damId: mail.damId ?? null,
    revisionId: mail.revisionId ?? null,
    digestId,
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
    // Links that work once stand in no mail that may wait, and are kept nowhere else.
    ...(mayWait(mail.kind) ? { brief: mail.brief, link: mail.link } : {}),
    state,
    createdAt: clock.now(),
    nextAttemptAt: clock.now(),
  });
  if (state === 'waiting') await jobs.enqueue(manager, 'send-mail', id);
  return id;
}

/** Readers in the order in which their digests are taken, so that two writers of mails never wait for each other. */
export const inLockingOrder = <T extends { id: string }>(readers: readonly T[]): T[] =>
  [...readers].sort((a, b) => (a.id < b.id ? -1 : 1));

async function onWriting(deps: MailDeps, { kind, personId, digestId }: MailInput) {
  const reader =
    personId === null || !mayWait(kind) ? null : await deps.manager.findOneBy(PersonEntity, { id: personId });
  const timing: MailTiming = reader?.mailTiming ?? 'atOnce';
  const state = mailOnWriting(kind, timing);
  if (state === 'held' && reader) return { state, digestId: await openDigestOf(deps, reader) };
  return { state, digestId: digestId ?? null };
}

/**
 * Sends a mail again that arrived nowhere or got lost. One that was sent goes as a new mail, since a mailbox would
 * drop the same Message-ID. One that was held or went within a digest goes by itself.
 * @throws AppError not-found, conflict
 */
export async function sendAgain({ manager, jobs, config, clock }: MailDeps, mailId: string): Promise<void> {
  const mail = await manager.findOne(OutboxMailEntity, {
    where: { id: mailId },
    lock: { mode: 'pessimistic_write' },
  });
  if (!mail) throw notFound('There is no such mail.');
  if (mail.text.includes('#(hidden)'))
    throw conflict(
      'conflict',
      'This mail cannot be sent again',
      'It carried a link that works once and is not kept. Invite the person again, or let them ask for a new link.',
    );
  await manager.update(
    OutboxMailEntity,
    { id: mailId },
    {
      state: 'waiting',
      attempts: 0,
      lastError: '',
      nextAttemptAt: clock.now(),
      sentAt: null,
      ...(mail.state === 'sent' ? { messageId: newMessageId(config) } : {}),
    },
  );
  await jobs.enqueue(manager, 'send-mail', mailId);
}
