import type { PersonDto } from '#shared/contract/people.ts';
import { inLanguage } from './language.ts';

const STATES: Record<PersonDto['state'], string> = {
  active: 'active',
  invited: 'invited, not yet accepted',
  deactivated: 'deactivated',
};

const en = {
  title: 'People',
  lead: 'Everybody with an account here. Parts on a dam are given on the dam.',
  activity: 'Accounts and invitations',
  caption: 'People of this installation',
  person: 'Person',
  state: 'State',
  part: 'Account',
  since: 'Since',
  stateName: (state: PersonDto['state']) => STATES[state],
  administrator: 'administrator',
  member: 'member',
  you: 'you',
  makeAdmin: 'Make administrator',
  makeAdminOf: (name: string) => `Make administrator: ${name}`,
  makeMember: 'Make member',
  makeMemberOf: (name: string) => `Make member: ${name}`,
  deactivate: 'Deactivate',
  deactivateOf: (name: string) => `Deactivate ${name}`,
  activate: 'Activate',
  activateOf: (name: string) => `Activate ${name}`,
  changes: 'Changes',
  invite: 'Invite a person',
  inviteLead: 'A mail with a link is sent. The link works once and for seven days.',
  email: 'E-mail address',
  asAdmin: 'as an administrator',
  asAdminHint: 'Makes dams, keeps people and mails in order; does not trace or check.',
  sendInvitation: 'Send the invitation',
  invited: (email: string) => `${email} has been written to.`,
  done: (name: string) => `The account of ${name} is changed.`,
} as const;
export const peopleText = inLanguage({ en });
