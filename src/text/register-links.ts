import { inLanguage } from './language.ts';

/** Words of the ways to the register, apart from its own: the list of dams is part of the first load. */
const en = {
  open: 'Register of all drawings',
  ofDam: 'Search and filter these drawings',
  menu: 'Register',
} as const;
export const registerLinkText = inLanguage({ en });
