import { colourJpeg, groupFour } from './large-sheet.ts';
import { A1 } from './line-work.ts';

/** A1 at 300 dpi, landscape. */
export const A1_PX = { width: A1.width, height: A1.height };

/** 1 bit, CCITT group 4. */
export const a1GroupFour = (): Promise<Buffer> => groupFour(A1);

/** Colour on grained paper, quality 90. */
export const a1Jpeg = (): Promise<Buffer> => colourJpeg(A1);
