import type { MailTiming } from '#shared/contract/mails.ts';
import { inLanguage } from './language.ts';

const TIMINGS: Record<MailTiming, string> = {
  atOnce: 'Each at once',
  daily: 'Together, once a day',
  off: 'Not by mail',
};

/** How notices come by mail: on the account page, and on the page that the link of a digest opens. */
const en = {
  title: 'Notices by mail',
  lead: 'For notes that name you, acceptances of your nets, and dams you are added to.',
  always:
    'Always at once: what asks something of you or warns you. Nets to check, reminders, returned nets, withdrawn acceptances, invitations and passwords.',
  legend: 'How they come',
  timing: (timing: MailTiming) => TIMINGS[timing],
  dailyHint: (hour: string, zone: string) => `At ${hour} by the clock in ${zone}.`,
  offHint: 'They stay to be read on the drawings.',
  held: (count: number, when: string) =>
    `${count} ${count === 1 ? 'notice waits' : 'notices wait'} for the digest of ${when}.`,
  takeZone: (zone: string) => `Use this computer’s time zone, ${zone}`,
  saved: 'Saved.',
  stopTitle: 'Stop the daily digest',
  stopLead:
    'Notices will no longer be mailed to you. What asks something of you, such as a net to check, still comes.',
  stop: 'Stop the digest',
  stopped: 'The daily digest is stopped. You can choose anew on your account page.',
  toAccount: 'Your account',
  stopInvalidTitle: 'This link does not work',
  stopInvalid: 'The link is incomplete. Sign in and choose on your account page how notices come.',
} as const;
export const mailChoiceText = inLanguage({ en });
