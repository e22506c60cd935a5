import { inLanguage } from './language.ts';

/** Words about a sheet that is shown small while the whole of it is being prepared. */
const en = {
  progress: 'Sheet being prepared',
  underWay:
    'The sheet is being prepared. A smaller picture of it stands here until then; what is placed on it stays where it is.',
  onlySmall: 'Only a small picture of this sheet could be made: fine lines may be missing.',
  openDrawing: 'See why on the page of the drawing',
  reduced: 'A smaller picture, until the sheet is ready',
} as const;
export const firstViewText = inLanguage({ en });
