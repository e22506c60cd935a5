import { v7 as uuidv7 } from 'uuid';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Letter } from '#server/mail/templates/letter.ts';
import type { ServiceDeps } from './service-deps.ts';

export interface MailInput extends Letter {
  /** The person it is for, who may read it in the demo; null for an address without a person. */
  personId: string | null;
  to: string;
}

type MailDeps = Pick<ServiceDeps, 'manager' | 'jobs' | 'config' | 'clock'>;

const newMessageId = (config: MailDeps['config']) => `<${uuidv7()}@${new URL(config.publicUrl).hostname}>`;

/**
 * Writes a mail to the outbox and wakes the worker, both in the caller's transaction: a mail that is announced is
 * sent, and nothing is sent for a change that was taken back.
 */
export async function queueMail(
  { manager, jobs, config, clock }: MailDeps,
  mail: MailInput,
): Promise<string> {
  const id = uuidv7();
  await manager.insert(OutboxMailEntity, {
    id,
    messageId: newMessageId(config),
    personId: mail.personId,
    toAddress: mail.to,
    subject: mail.subject,
    text: mail.text,
    html: mail.html,
    createdAt: clock.now(),
    nextAttemptAt: clock.now(),
  });
  await jobs.enqueue(manager, 'send-mail', id);
  return id;
}

/**
 * Sends a mail again that arrived nowhere or got lost. One that was sent goes as a new mail, since a mailbox would
 * drop the same Message-ID.
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
