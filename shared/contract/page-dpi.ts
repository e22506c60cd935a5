import * as z from 'zod/mini';
import { MAX_DPI, MAX_DRAWN_SIDE_PX, MAX_PIXELS, MIN_DPI } from './limits.ts';

/** Resolution at which a page of vectors is to be drawn instead of the usual. */
export const drawAgainInput = z.object({
  dpi: z.number().check(z.int(), z.gte(MIN_DPI), z.lte(MAX_DPI)),
});

/** Finest resolution in whole dots per inch at which a page of this size, in inches, has at most `pixels` pixels. */
export function mostDpi(widthIn: number, heightIn: number, pixels = MAX_PIXELS): number {
  const byArea = Math.sqrt(pixels / (widthIn * heightIn));
  const bySide = MAX_DRAWN_SIDE_PX / Math.max(widthIn, heightIn);
  return Math.floor(Math.min(byArea, bySide));
}
