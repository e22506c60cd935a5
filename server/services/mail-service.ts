import { v7 as uuidv7 } from 'uuid';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import type { Letter } from '#server/mail/templates/letter.ts';
import type { ServiceDeps } from './service-deps.ts';

export interface MailInput extends Letter {
  /** The person it is for, who may read it in the demo; null for an address without a person. */
  personId: string | null;
  to: string;
}

/**
 * Writes a mail to the outbox and wakes the worker, both in the caller's transaction: a mail that is announced is
 * sent, and nothing is sent for a change that was taken back.
 */
export async function queueMail(
  { manager, jobs, config, clock }: Pick<ServiceDeps, 'manager' | 'jobs' | 'config' | 'clock'>,
  mail: MailInput,
): Promise<string> {
  const id = uuidv7();
  await manager.insert(OutboxMailEntity, {
    id,
    messageId: `<${id}@${new URL(config.publicUrl).hostname}>`,
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
