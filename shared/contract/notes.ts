import * as z from 'zod/mini';
import { id, personRef, timestamp } from './common.ts';
import { sheetPoint } from './document.ts';
import { MAX_NOTE_FILES, MAX_NOTE_LENGTH } from './limits.ts';
import { titleBlockCell } from './reading.ts';

/** What a note is about. `at` is where its balloon stands, kept for the case that the entity goes. */
export const noteAnchor = z.discriminatedUnion('on', [
  z.object({ on: z.literal('readingPoint'), entityId: id, at: sheetPoint }),
  z.object({ on: z.literal('line'), entityId: id, at: sheetPoint }),
  z.object({ on: z.literal('profile'), entityId: id, at: sheetPoint }),
  /** A cell of the net, by the two lines of equal head and the two in the direction of flow around it. */
  z.object({ on: z.literal('cell'), heads: z.tuple([id, id]), flows: z.tuple([id, id]), at: sheetPoint }),
  z.object({ on: z.literal('place'), at: sheetPoint }),
  /** A figure of the title block. */
  z.object({
    on: z.literal('titleBlock'),
    cell: z.enum([...titleBlockCell.options, 'drawn', 'checked', 'calculation']),
  }),
  z.object({ on: z.literal('drawing') }),
]);
export type NoteAnchor = z.infer<typeof noteAnchor>;

const noteText = z.string().check(z.trim(), z.minLength(1), z.maxLength(MAX_NOTE_LENGTH));
/** Files uploaded before for this text, which take their place in it. */
const fileIds = z.optional(z.array(id).check(z.maxLength(MAX_NOTE_FILES)));

export const noteInput = z.object({ id, anchor: noteAnchor, text: noteText, fileIds });
export const answerInput = z.object({ id, text: noteText, fileIds });
export const entryPatch = z.object({ text: noteText });
/** How many entries, counted from the first, the reader has seen. */
export const readInput = z.object({ entries: z.number().check(z.int(), z.gte(1)) });

/** Files of notes, of the kinds that drawings may be. */
export const noteFileDto = z.object({
  id,
  fileName: z.string(),
  mediaType: z.string(),
  byteSize: z.number(),
});
export type NoteFileDto = z.infer<typeof noteFileDto>;

export const noteEntryDto = z.object({
  id,
  author: personRef,
  text: z.string(),
  at: timestamp,
  /** When its text was last changed; null when it never was. */
  editedAt: z.nullable(timestamp),
  /** Those named with @ in the text. */
  named: z.array(personRef),
  files: z.array(noteFileDto),
});
export type NoteEntryDto = z.infer<typeof noteEntryDto>;

const byWhom = z.nullable(z.object({ by: personRef, at: timestamp }));

export const noteDto = z.object({
  id,
  netId: id,
  /** Number in its balloon, counted within the net. */
  number: z.number(),
  anchor: noteAnchor,
  state: z.enum(['open', 'answered', 'closed']),
  createdAt: timestamp,
  /** The newest answer by somebody other than the author; null while it is open. */
  answered: byWhom,
  closedBy: z.nullable(personRef),
  closedAt: z.nullable(timestamp),
  /** Who wants it answered before acceptance; null when nothing waits for it. */
  mustAnswer: byWhom,
  /** Entries of others that the reader has not seen. */
  unread: z.number(),
  entries: z.array(noteEntryDto),
});
export type NoteDto = z.infer<typeof noteDto>;
export const noteListDto = z.object({ items: z.array(noteDto) });

/** What an entry said before, the newest first. */
export const earlierTextsDto = z.object({
  items: z.array(z.object({ id, text: z.string(), replacedAt: timestamp })),
});
