import * as z from 'zod/mini';
import { id, pageOf, pageQuery, personRef, timestamp } from './common.ts';

/** What the register lists. */
export const registerKind = z.enum(['drawing', 'section', 'net']);
export type RegisterKind = z.infer<typeof registerKind>;

/**
 * Where the work stands: a drawing whose file is being prepared or cannot be used; `bare` is a drawing or section
 * without a net; the others are of nets, and of a section or drawing that has such nets.
 */
export const registerState = z.enum([
  'preparing',
  'unusable',
  'bare',
  'draft',
  'sent',
  'returned',
  'accepted',
]);
export type RegisterState = z.infer<typeof registerState>;

/** `number`: as a register is kept, each drawing followed by its sections and nets. `newest`: latest work first. */
export const registerSort = z.enum(['number', 'newest', 'dam']);
export type RegisterSort = z.infer<typeof registerSort>;

/** Characters of a search: a title typed in whole stays below it. */
export const MAX_SEARCH_LENGTH = 200;
/** Rows that are counted; beyond, the register says "more than". */
export const MAX_COUNTED = 1000;

export const registerQuery = z.extend(pageQuery, {
  /** Words of titles, numbers, names and notes; the last one may be the beginning of a word. */
  q: z.optional(z.string().check(z.trim(), z.maxLength(MAX_SEARCH_LENGTH))),
  kind: z.optional(registerKind),
  state: z.optional(registerState),
  dam: z.optional(id),
  /** Who added the drawing, made the section, or made or drew the net. */
  whose: z.optional(z.union([z.literal('me'), id])),
  archived: z.optional(z.enum(['yes', 'no'])),
  sort: z.optional(registerSort),
});
export type RegisterQuery = z.output<typeof registerQuery>;

/** A piece of a note, marked where it is one of the words searched for. */
const foundPart = z.object({ text: z.string(), isHit: z.boolean() });

export const registerRow = z.object({
  kind: registerKind,
  id,
  damId: id,
  damName: z.string(),
  drawing: z.object({
    id,
    number: z.string(),
    revision: z.string(),
    title: z.string(),
    fileName: z.string(),
  }),
  section: z.nullable(z.object({ id, name: z.string(), chainage: z.string() })),
  /** Name of the net. */
  net: z.nullable(z.string()),
  /** The sheet that stands for the row in small, and the cleaned-up picture by which it is shown. */
  sheet: z.nullable(z.object({ id, pageNumber: z.number(), pictureId: z.nullable(id) })),
  states: z.array(registerState),
  /** Label of the newest revision of a net. */
  revisionLabel: z.nullable(z.string()),
  madeBy: personRef,
  at: timestamp,
  /** Put away itself, or with its section, drawing or dam. */
  isArchived: z.boolean(),
  openNotes: z.number(),
  /** Notes in which others wrote what the reader has not seen; none for who has no part on the dam. */
  unreadNotes: z.number(),
  /** The note that was found, where the search was found in a note. */
  found: z.nullable(z.object({ noteNumber: z.number(), parts: z.array(foundPart) })),
});
export type RegisterRow = z.infer<typeof registerRow>;

/** `GET /register`. `total`: on the first page, rows up to one more than are counted; null on the others. */
export const registerPage = z.extend(pageOf(registerRow), { total: z.nullable(z.number()) });
export type RegisterPage = z.infer<typeof registerPage>;
