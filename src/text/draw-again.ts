import { inLanguage } from './language.ts';

/** Words about the resolution at which a page of vectors is drawn. */
const en = {
  label: 'Resolution',
  choice: (dpi: number, widthPx: string, heightPx: string) =>
    `${dpi} dots per inch, ${widthPx} × ${heightPx} px`,
  hint: (most: number) =>
    `This page is vectors and can be drawn at up to ${most} dots per inch; 300 is usual. Choose before the first section is made: traces are kept in the sheet’s pixels.`,
  drawAgain: 'Draw again',
  drawing: 'The page is being drawn again',
} as const;
export const drawAgainText = inLanguage({ en });
