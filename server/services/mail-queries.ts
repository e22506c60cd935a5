import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import type { AppConfig } from '#server/config/config.ts';
import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { allowsGlobally } from '#server/policies/dam-policy.ts';
import { PAGE_SIZE } from '#shared/contract/limits.ts';
import type { MailDto, mailDetailDto, mailListDto, mailListQuery } from '#shared/contract/mails.ts';
import { fromCursor, positionTime, toCursor } from './cursor.ts';
import { hideTokens } from './mail-delivery.ts';

/** In the demo mails are read here instead of in a mailbox, so their links have to work. */
const areLinksShown = (config: AppConfig) => config.smtpUrl === null && !config.production;

const toDto = (mail: OutboxMailEntity): MailDto => ({
  id: mail.id,
  to: mail.toAddress,
  subject: mail.subject,
  state: mail.state,
  attempts: mail.attempts,
  lastError: mail.lastError,
  createdAt: mail.createdAt.toISOString(),
  sentAt: mail.sentAt?.toISOString() ?? null,
});

/** Administrators see every mail, others those to themselves; newest first. */
export async function listMails(
  manager: EntityManager,
  actor: Actor,
  { cursor, state }: z.output<typeof mailListQuery>,
): Promise<z.input<typeof mailListDto>> {
  const query = manager
    .createQueryBuilder(OutboxMailEntity, 'mail')
    .addSelect(positionTime('mail.created_at'), 'position')
    .orderBy('mail.createdAt', 'DESC')
    .addOrderBy('mail.id', 'DESC')
    .limit(PAGE_SIZE + 1);
  const own: { personId?: string } = allowsGlobally('mail.read', actor) ? {} : { personId: actor.id };
  if (own.personId) query.andWhere('mail.personId = :personId', own);
  if (state) query.andWhere('mail.state = :state', { state });
  if (cursor)
    query.andWhere('(mail.created_at, mail.id) < (:at::timestamptz, :id::uuid)', fromCursor(cursor));
  const { entities, raw } = await query.getRawAndEntities<{ position: string }>();
  const last = entities[PAGE_SIZE - 1];
  const nextCursor =
    last && entities.length > PAGE_SIZE
      ? toCursor({ at: raw[PAGE_SIZE - 1]?.position ?? '', id: last.id })
      : null;
  const failed = await manager.countBy(OutboxMailEntity, { ...own, state: 'failed' });
  return { items: entities.slice(0, PAGE_SIZE).map(toDto), nextCursor, failed };
}

/** @throws AppError not-found, also for mail to somebody else */
export async function getMail(
  { manager, config }: { manager: EntityManager; config: AppConfig },
  actor: Actor,
  mailId: string,
): Promise<z.input<typeof mailDetailDto>> {
  const mail = await manager.findOneBy(OutboxMailEntity, { id: mailId });
  if (!mail || (mail.personId !== actor.id && !allowsGlobally('mail.read', actor)))
    throw notFound('There is no such mail.');
  const shown = areLinksShown(config) ? (text: string) => text : hideTokens;
  return { ...toDto(mail), messageId: mail.messageId, text: shown(mail.text), html: shown(mail.html) };
}
