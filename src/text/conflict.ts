import { inLanguage } from './language.ts';

/** Words of the picture of two versions. */
const en = {
  picture: 'Both versions, one over the other',
  mine: 'Your version',
  theirs: 'The other version',
  noMine: 'You removed it',
  noTheirs: 'Removed by the other',
  rest: 'The rest of the net in grey.',
} as const;

export const conflictText = inLanguage({ en });
