import * as z from 'zod/mini';
import { id, timestamp } from './common.ts';

export const mailDto = z.object({
  id,
  to: z.string(),
  subject: z.string(),
  state: z.enum(['waiting', 'sent', 'failed']),
  attempts: z.number(),
  lastError: z.string(),
  createdAt: timestamp,
  sentAt: z.nullable(timestamp),
});
export type MailDto = z.infer<typeof mailDto>;
export const mailListDto = z.object({ items: z.array(mailDto), nextCursor: z.nullable(z.string()) });
export const mailDetailDto = z.extend(mailDto, { messageId: z.string(), text: z.string(), html: z.string() });
