import type { MailKind, MailTiming } from '#shared/contract/mails.ts';

/**
 * What may wait for a daily digest. A mail waits only when nobody else waits for its reader: whoever is asked to check
 * or to draw again holds a colleague up; a withdrawn acceptance must reach its reader before the figures are used, and
 * a withdrawn sending before a day is spent on it; invitations and links for a password are asked for at that moment.
 */
const MAY_WAIT: Record<MailKind, boolean> = {
  invitation: false,
  passwordReset: false,
  sentForChecking: false,
  dueTomorrow: false,
  overdue: false,
  sendingWithdrawn: false,
  returned: false,
  acceptanceWithdrawn: false,
  addedToDam: true,
  accepted: true,
  acceptedWithNotes: true,
  namedInNote: true,
  digest: false,
};

export const mayWait = (kind: MailKind): boolean => MAY_WAIT[kind];

/** What becomes of a mail when it is written, by its kind and by its reader's choice. */
export function mailOnWriting(kind: MailKind, timing: MailTiming): 'waiting' | 'held' | 'dropped' {
  if (!MAY_WAIT[kind] || timing === 'atOnce') return 'waiting';
  return timing === 'daily' ? 'held' : 'dropped';
}
