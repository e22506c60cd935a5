import * as z from 'zod/mini';
import { id, requiredText } from './common.ts';
import { sheetPoint } from './document.ts';
import { sectionDto } from './drawings.ts';
import { MAX_MATCHED_PLACES } from './limits.ts';

/** One place of the drawing on both sheets, in the pixels of each. */
export const matchedPlace = z.object({ from: sheetPoint, to: sheetPoint });

/** `POST /sheets/:sheetId/carried-sections`: a section of another sheet, with nets of it, put on this sheet. */
export const carriedSectionInput = z.object({
  /** Of the section that is made. */
  id,
  name: requiredText,
  fromSectionId: id,
  shape: z.enum(['similarity', 'affine']),
  places: z.array(matchedPlace).check(z.minLength(2), z.maxLength(MAX_MATCHED_PLACES)),
  /** The nets to be carried, each with the id of the net that is made of it. */
  nets: z.array(z.object({ fromNetId: id, id })).check(z.maxLength(100)),
});
export type CarriedSectionInput = z.infer<typeof carriedSectionInput>;

export const carriedSectionDto = z.object({
  section: sectionDto,
  /** Pixels of the new sheet between each place and where the match puts it. */
  residualsPx: z.array(z.number()),
  /** What was done otherwise than it stood, in whole sentences. */
  told: z.array(z.string()),
});
export type CarriedSectionDto = z.infer<typeof carriedSectionDto>;
