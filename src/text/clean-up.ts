import { inLanguage } from './language.ts';

/** Words of the switch between a sheet's cleaned-up picture and its scan, on the desk. */
const enDesk = {
  picture: 'The sheet is shown',
  cleaned: 'Cleaned up',
  cleanedTitle: 'The cleaned-up picture of this sheet; the traces stay where they are',
  original: 'Scan',
  originalTitle: 'The sheet as it was scanned; the traces stay where they are',
} as const;
export const deskPictureText = inLanguage({ en: enDesk });
