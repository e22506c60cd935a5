import { MIN_PASSWORD_LENGTH } from '#shared/contract/limits.ts';
import { inLanguage } from './language.ts';

const en = {
  signIn: 'Sign in',
  signingIn: 'Signing in…',
  signInLead: 'Flow nets on dam drawings, read to pore pressures with their reasons.',
  email: 'E-mail address',
  password: 'Password',
  newPassword: 'New password',
  newPasswordHint: `At least ${MIN_PASSWORD_LENGTH} characters.`,
  passwordTooShort: `The password needs at least ${MIN_PASSWORD_LENGTH} characters.`,
  currentPassword: 'Present password',
  name: 'Name',
  nameHint: 'As it shall stand on sheets and mails.',
  nameMissing: 'Enter your name.',
  forgot: 'Forgotten your password?',
  byInvitation: 'Accounts are by invitation: ask the administrator or an engineer of your dam.',
  demoTitle: 'This is the demo',
  demoLead: 'Sign in as one of its people:',
  signInAs: (name: string, part: string) => `${name}, ${part}`,
  sameWork: 'The demo keeps what you do until it is reset.',

  againTitle: 'Sign in again',
  againLead: 'Your sign-in has ended. This page stays as it is and goes on once you have signed in.',
  leave: 'Leave this page',

  invitationTitle: 'Accept the invitation',
  invitationLead: (inviter: string, dam: string | null) =>
    dam ? `${inviter} invites you to ${dam}.` : `${inviter} invites you.`,
  invitationFor: 'For',
  accept: 'Accept and sign in',
  invitationInvalid:
    'The invitation was used already, has expired, or the address was not copied whole. Ask for a new one.',
  toSignIn: 'Go to the sign-in page',

  resetTitle: 'Reset your password',
  resetLead:
    'Enter your e-mail address. If it belongs to an account, a link to set a new password is sent to it.',
  sendLink: 'Send the link',
  linkSent:
    'If the address belongs to an account, a mail with a link is on its way. The link works once and for one hour.',
  setTitle: 'Set a new password',
  setPassword: 'Set the password',
  passwordSet: 'The password is set. Sign in with it.',
  resetInvalid: 'The link was used already, has expired, or was not copied whole.',
  askAgain: 'Ask for a new link',

  nameSaved: 'The name is saved.',
  changePassword: 'Change the password',
  passwordChanged: 'The password is changed. Other browsers have been signed out.',
  endAllTitle: 'Sign out everywhere',
  endAllLead:
    'Ends your sign-in in every browser, this one too. Do this when a computer with your sign-in was lost.',
  endAll: 'Sign out everywhere',
} as const;
export const sessionText = inLanguage({ en });
