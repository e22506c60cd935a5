import * as z from 'zod/mini';
import { id, personRef, timestamp } from './common.ts';
import { sheetPoint } from './document.ts';
import { MAX_NOTE_LENGTH } from './limits.ts';

/** What a note is about. `at` is where its balloon stands, kept for the case that the entity goes. */
export const noteAnchor = z.discriminatedUnion('on', [
  z.object({ on: z.literal('readingPoint'), entityId: id, at: sheetPoint }),
  z.object({ on: z.literal('line'), entityId: id, at: sheetPoint }),
  z.object({ on: z.literal('place'), at: sheetPoint }),
]);
export type NoteAnchor = z.infer<typeof noteAnchor>;

const noteText = z.string().check(z.trim(), z.minLength(1), z.maxLength(MAX_NOTE_LENGTH));

export const noteInput = z.object({ id, anchor: noteAnchor, text: noteText });
export const answerInput = z.object({ id, text: noteText });

export const noteDto = z.object({
  id,
  netId: id,
  /** Number in its balloon, counted within the net. */
  number: z.number(),
  anchor: noteAnchor,
  state: z.enum(['open', 'answered', 'closed']),
  createdAt: timestamp,
  closedBy: z.nullable(personRef),
  closedAt: z.nullable(timestamp),
  entries: z.array(z.object({ id, author: personRef, text: z.string(), at: timestamp })),
});
export type NoteDto = z.infer<typeof noteDto>;
export const noteListDto = z.object({ items: z.array(noteDto) });
