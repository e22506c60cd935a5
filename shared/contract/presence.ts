import * as z from 'zod/mini';
import { id, personRef } from './common.ts';

/** Milliseconds between two signs of life of an open desk. */
export const PRESENCE_BEAT_MS = 5000;
/** Milliseconds after which a desk that gave no sign of life counts as closed: three signs lost on the way. */
export const PRESENCE_LEASE_MS = 15_000;

const toolName = z.string().check(z.maxLength(40));

/** What a desk tells of itself: the tool in hand, and the line or point that is chosen or under way. */
export const presenceBeat = z.object({ tool: toolName, entityId: z.nullable(id) });
export type PresenceBeat = z.infer<typeof presenceBeat>;

/** An open desk of somebody: `clientId` tells two windows of one person apart. */
export const presentDesk = z.object({
  clientId: id,
  person: personRef,
  tool: toolName,
  entityId: z.nullable(id),
});
export type PresentDesk = z.infer<typeof presentDesk>;

/** Who has the net open now, by name. */
export const presenceDto = z.object({ desks: z.array(presentDesk) });
export type PresenceDto = z.infer<typeof presenceDto>;
