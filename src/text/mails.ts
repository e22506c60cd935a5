import type { MailDto } from '#shared/contract/mails.ts';
import { inLanguage } from './language.ts';

const STATES: Record<MailDto['state'], string> = {
  waiting: 'waiting',
  sent: 'sent',
  failed: 'not delivered',
};

const en = {
  title: 'Mails',
  mail: 'Mail',
  lead: 'Mails this installation has sent or is sending.',
  leadOutbox: 'No mail server is set: mails are written to the outbox folder and can be read here.',
  none: 'No mail has been written yet. Send a net for checking or invite somebody, and it stands here.',
  caption: 'Mails, newest first',
  to: 'To',
  subject: 'Subject',
  state: 'State',
  written: 'Written',
  stateName: (state: MailDto['state']) => STATES[state],
  attempts: (count: number) => `${count} ${count === 1 ? 'try' : 'tries'}`,
  more: 'Show earlier mails',
  sentAt: (when: string) => `Sent ${when}.`,
  waiting: 'Waiting to be sent.',
  failed: (reason: string) => `Could not be delivered: ${reason}`,
  sendAgain: 'Send again',
  sendAgainDone: 'The mail will be sent again.',
  messageId: 'Message-ID',
  open: 'Open the link',
} as const;
export const mailsText = inLanguage({ en });
