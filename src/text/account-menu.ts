import { inLanguage } from './language.ts';

/** Words of the account's menu, which every page shows. */
const en = {
  accountTitle: 'Your account',
  accountMenu: (initials: string, name: string) => `${initials}, account of ${name}`,
  people: 'People',
  mails: 'Mails',
  signOut: 'Sign out',
  admin: 'administrator',
} as const;
export const accountMenuText = inLanguage({ en });
