import type { MailKind, MailState } from '#shared/contract/mails.ts';
import { inLanguage } from './language.ts';

const STATES: Record<MailState, string> = {
  waiting: 'waiting',
  sent: 'sent',
  failed: 'not delivered',
  held: 'for the next digest',
  inDigest: 'sent in a digest',
  dropped: 'not wanted by mail',
};

const KINDS: Record<MailKind, string> = {
  sentForChecking: 'Sent for checking',
  dueTomorrow: 'Check due tomorrow',
  overdue: 'Check overdue',
  sendingWithdrawn: 'Sending withdrawn',
  accepted: 'Accepted',
  acceptedWithNotes: 'Accepted with notes',
  returned: 'Returned',
  acceptanceWithdrawn: 'Acceptance withdrawn',
  namedInNote: 'Named in a note',
  digest: 'Daily digest',
  addedToDam: 'Added to a dam',
  invitation: 'Invitation',
  passwordReset: 'New password',
};

const counted = (count: number) => `${count} ${count === 1 ? 'mail' : 'mails'}`;

const en = {
  title: 'Mails',
  mail: 'Mail',
  lead: 'Mails this installation has sent or is sending.',
  leadOutbox: 'No mail server is set: mails are written to the outbox folder and can be read here.',
  none: 'No mail has been written yet. Send a net for checking or invite somebody, and it stands here.',
  noneOfState: 'No mail is in this state.',
  caption: 'Mails, newest first',
  to: 'To',
  subject: 'Subject',
  state: 'State',
  written: 'Written',
  action: 'Action',
  stateName: (state: MailState) => STATES[state],
  kindName: (kind: MailKind) => KINDS[kind],
  attempts: (count: number) => `${count} ${count === 1 ? 'try' : 'tries'}`,
  more: 'Show earlier mails',
  sentAt: (when: string) => `Sent ${when}.`,
  waiting: 'Waiting to be sent.',
  held: 'Goes out with the next digest of this person.',
  inDigest: 'Went out within a digest.',
  dropped: 'Not sent: this person wants no notices by mail, or no longer belongs to the dam.',
  failed: (reason: string) => `Could not be delivered: ${reason}`,
  undelivered: (count: number) => `${counted(count)} could not be delivered`,
  undeliveredLead: 'Mend what the reason names, such as an address or the mail server, and send them again.',
  show: 'Show',
  all: 'all',
  sendAgain: 'Send again',
  sendAgainOf: (subject: string) => `Send again: ${subject}`,
  sendAgainDone: 'The mail will be sent again.',
  messageId: 'Message-ID',
  open: 'Open the link',
  templates: 'Templates',
  templatesTitle: 'Mail templates',
  templatesLead:
    'Every kind of mail with sample data, as it goes out. The people, the dam and the figures are invented.',
  kinds: 'Kinds of mail',
  asHtml: 'HTML',
  asText: 'Plain text',
  view: 'Shown as',
  preview: (kind: string) => `Preview: ${kind}`,
  mayWait: 'May wait for a daily digest.',
  neverWaits: 'Always sent at once.',
  atDigestHour: 'Sent at seven in the morning by the clock of its reader.',
} as const;
export const mailsText = inLanguage({ en });
