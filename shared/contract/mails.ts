import * as z from 'zod/mini';
import { id, pageQuery, timestamp } from './common.ts';

/** What a mail is about. Each kind has one template. */
export const mailKind = z.enum([
  'invitation',
  'addedToDam',
  'passwordReset',
  'sentForChecking',
  'dueTomorrow',
  'overdue',
  'sendingWithdrawn',
  'accepted',
  'acceptedWithNotes',
  'returned',
  'acceptanceWithdrawn',
  'namedInNote',
  'digest',
]);
export type MailKind = z.infer<typeof mailKind>;

/** `held`: for the next digest. `inDigest`: went out within one. `dropped`: the person wants no such mail. */
export const mailState = z.enum(['waiting', 'sent', 'failed', 'held', 'inDigest', 'dropped']);
export type MailState = z.infer<typeof mailState>;

export const mailListQuery = z.extend(pageQuery, { state: z.optional(mailState) });

export const mailDto = z.object({
  id,
  to: z.string(),
  subject: z.string(),
  state: mailState,
  attempts: z.number(),
  lastError: z.string(),
  createdAt: timestamp,
  sentAt: z.nullable(timestamp),
});
export type MailDto = z.infer<typeof mailDto>;
export const mailListDto = z.object({
  items: z.array(mailDto),
  nextCursor: z.nullable(z.string()),
  /** Mails among those one may see that could not be delivered. */
  failed: z.number(),
});
export const mailDetailDto = z.extend(mailDto, { messageId: z.string(), text: z.string(), html: z.string() });

/** How notices that may wait come to a person: each at once, together once a day, or not at all. */
export const mailTiming = z.enum(['atOnce', 'daily', 'off']);
export type MailTiming = z.infer<typeof mailTiming>;
/** Hour of the person's own day at which the digest is made. */
export const DIGEST_HOUR = 7;

export const mailChoiceDto = z.object({
  timing: mailTiming,
  /** IANA name of the time zone in which the digest's hour is meant. */
  timeZone: z.string(),
  /** When the next digest goes out; null while nothing waits for one. */
  nextDigestAt: z.nullable(timestamp),
  /** Notices that wait for it. */
  held: z.number(),
});
export type MailChoiceDto = z.infer<typeof mailChoiceDto>;
export const mailChoiceInput = z.object({
  timing: mailTiming,
  timeZone: z.string().check(z.minLength(1), z.maxLength(100)),
});
export const digestStopQuery = z.object({ token: z.string().check(z.maxLength(200)) });

/** A template filled with sample data. */
export const mailTemplateDto = z.object({
  kind: mailKind,
  /** May wait for a digest. */
  mayWait: z.boolean(),
  subject: z.string(),
  text: z.string(),
  html: z.string(),
});
export type MailTemplateDto = z.infer<typeof mailTemplateDto>;
export const mailTemplateListDto = z.object({ items: z.array(mailTemplateDto) });
