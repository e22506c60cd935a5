import * as z from 'zod/mini';
import { id } from './common.ts';

/**
 * Events of `GET /live` (server-sent events, one stream for each browser). They carry ids only; the reader
 * fetches what it shows. `number` is the net's change counter for `net` events.
 */
export const liveEvent = z.discriminatedUnion('type', [
  z.object({ type: z.literal('net'), damId: id, netId: id, number: z.number(), clientId: z.nullable(id) }),
  z.object({ type: z.literal('notes'), damId: id, netId: id }),
  // Somebody came to the net, left it, or took up something else there.
  z.object({ type: z.literal('presence'), damId: id, netId: id }),
  z.object({ type: z.literal('revisions'), damId: id, netId: id }),
  z.object({ type: z.literal('drawing'), damId: id, drawingId: id }),
  z.object({ type: z.literal('dam'), damId: id }),
  // Told to that person only: their sign-in or their parts changed, so ask `GET /session` and the lists again.
  z.object({ type: z.literal('person'), personId: id }),
  // Told to that person only: they have read notes of the net, in this window or another.
  z.object({ type: z.literal('notesRead'), personId: id, netId: id }),
]);
export type LiveEvent = z.infer<typeof liveEvent>;
