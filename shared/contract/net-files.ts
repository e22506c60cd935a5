import * as z from 'zod/mini';
import { id, requiredText } from './common.ts';
import { netSummary } from './drawings.ts';
import { MAX_NET_FILE_BYTES } from './limits.ts';

/**
 * What a net file may be at odds with where it is put. It is asked about before a net is made: `datum`, the dam's
 * elevations are above another one; `setOut`, the section is set out otherwise.
 */
export const netFileQuestion = z.enum(['datum', 'setOut']);
export type NetFileQuestion = z.infer<typeof netFileQuestion>;

const fileMembers = {
  /** The text of the file, so that a fault can be told with its line. */
  text: z.string().check(z.maxLength(MAX_NET_FILE_BYTES)),
  /** Questions that were answered with yes. */
  accepted: z.array(netFileQuestion),
};

/** `POST /sections/:sectionId/net-files`: a net of this section, made of a file. */
export const netFileInput = z.object({ id, name: requiredText, ...fileMembers });

/** `POST /dams/:damId/net-files`: a net on an empty sheet of the size that the file's net was traced on. */
export const netFileOnBlankInput = z.object({
  id,
  name: requiredText,
  sectionName: requiredText,
  ...fileMembers,
});

export const netFileDto = z.object({
  net: netSummary,
  /** What was done otherwise than the file says, in whole sentences. */
  told: z.array(z.string()),
});
export type NetFileDto = z.infer<typeof netFileDto>;

/** `extra` of the answer 409 while questions are open. */
export const netFileQuestions = z.object({
  questions: z.array(z.object({ code: netFileQuestion, text: z.string() })),
});
