import { type Letter, layOut } from './letter.ts';

export interface InvitationData {
  invitedBy: string;
  /** Null for an invitation to the installation as such. */
  damName: string | null;
  /** Parts on the dam in words: "engineer and reviewer". */
  parts: string;
  url: string;
  daysValid: number;
}

export function invitationMail({ invitedBy, damName, parts, url, daysValid }: InvitationData): Letter {
  const purpose = damName
    ? `${invitedBy} invites you to work on ${damName} in Tracehead, as ${parts}.`
    : `${invitedBy} invites you to Tracehead.`;
  return layOut({
    kind: 'invitation',
    subject: damName ? `Invitation to ${damName}` : 'Invitation to Tracehead',
    paragraphs: [
      purpose,
      'Tracehead reads pore pressures from flow nets on scanned dam sections. Follow the link to choose a password.',
    ],
    link: { label: 'Accept the invitation', url },
    closing: `The link works once and for ${daysValid} days. If you did not expect this, leave it unused.`,
  });
}

export interface AddedToDamData {
  addedBy: string;
  damName: string;
  parts: string;
  url: string;
}

export function addedToDamMail({ addedBy, damName, parts, url }: AddedToDamData): Letter {
  return layOut({
    kind: 'addedToDam',
    subject: `You now belong to ${damName}`,
    paragraphs: [`${addedBy} has added you to ${damName}, as ${parts}.`],
    link: { label: 'Open the dam', url },
    closing: 'Sign in with the e-mail address this was sent to.',
  });
}

export interface ResetData {
  url: string;
  minutesValid: number;
}

export function passwordResetMail({ url, minutesValid }: ResetData): Letter {
  return layOut({
    kind: 'passwordReset',
    subject: 'Choose a new password',
    paragraphs: ['Somebody, most likely you, asked for a new password for your sign-in to Tracehead.'],
    link: { label: 'Choose a new password', url },
    closing: `The link works once and for ${minutesValid} minutes. If you did not ask for it, do nothing: your password stays as it is.`,
  });
}
