import { OutboxMailEntity } from '#server/entities/mail-entity.ts';
import type { TestApp } from './test-app.ts';

/** The mails written for an address, oldest first. */
export const mailsTo = (app: TestApp, toAddress: string): Promise<OutboxMailEntity[]> =>
  app.db
    .getRepository(OutboxMailEntity)
    .find({ where: { toAddress }, order: { createdAt: 'ASC', id: 'ASC' } });

/** The token in the link of the newest mail to an address. */
export async function tokenMailedTo(app: TestApp, toAddress: string): Promise<string> {
  const mails = await mailsTo(app, toAddress);
  const token = /#([\w-]{43})/.exec(mails.at(-1)?.text ?? '')?.[1];
  if (!token) throw new Error(`No link with a token was mailed to ${toAddress}.`);
  return token;
}
