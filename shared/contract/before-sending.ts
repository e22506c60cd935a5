import * as z from 'zod/mini';
import { MAX_NOTE_LENGTH } from './limits.ts';

/** Something on a finished net that is still open before it is sent. It may stay, with a reason. */
export const openItem = z.object({
  /** Names the item for as long as it is open, so that a reason belongs to what it was given for. */
  key: z.string(),
  about: z.enum(['datum', 'scale', 'inputs', 'net', 'points', 'notes']),
  /** A sentence that says what is open and what would settle it. */
  text: z.string(),
});
export type OpenItem = z.infer<typeof openItem>;

/** An item that stayed open when a revision was sent, and why; frozen with the revision. */
export const stayedOpen = z.object({ ...openItem.shape, reason: z.string() });
export type StayedOpen = z.infer<typeof stayedOpen>;

export const openReason = z.object({
  key: z.string(),
  reason: z.string().check(z.trim(), z.minLength(1), z.maxLength(MAX_NOTE_LENGTH)),
});
