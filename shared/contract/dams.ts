import * as z from 'zod/mini';
import { damAction, damRole } from './actions.ts';
import { email, id, personRef, requiredText, shortText, timestamp } from './common.ts';
// Not from the document: the dams list is part of the first load and needs nothing else of it.
import { unitSystem } from './unit-system.ts';

const level = z.nullable(z.number().check(z.gte(-12_000), z.lte(30_000)));

export const damInput = z.object({
  name: requiredText,
  unitSystem,
  /** Name of the vertical datum, such as "local datum LD". */
  datum: shortText,
  fullSupplyLevel: level,
  /** kN/m³ (SI) or lb/ft³ (US). */
  gammaW: z.number().check(z.positive(), z.lte(200)),
});
export const damPatch = z.partial(damInput);

export const damDto = z.object({
  id,
  name: z.string(),
  unitSystem,
  datum: z.string(),
  fullSupplyLevel: z.nullable(z.number()),
  gammaW: z.number(),
  archivedAt: z.nullable(timestamp),
  /** The reader's own parts. */
  roles: z.array(damRole),
  /** What the reader may do here. */
  can: z.array(damAction),
  drawingCount: z.number(),
  openNoteCount: z.number(),
  /** Notes in which others wrote what the reader has not seen; none for who has no part on the dam. */
  unreadNoteCount: z.number(),
});
export type DamDto = z.infer<typeof damDto>;
export const damListDto = z.object({ items: z.array(damDto) });
export const damListQuery = z.object({ archived: z.optional(z.enum(['yes', 'no'])) });

export const memberDto = z.object({
  person: personRef,
  email: z.string(),
  roles: z.array(damRole),
  state: z.enum(['active', 'invited', 'deactivated']),
});
export type MemberDto = z.infer<typeof memberDto>;
export const memberListDto = z.object({ items: z.array(memberDto) });
export const memberRolesInput = z.object({ roles: z.array(damRole).check(z.minLength(1)) });
export const memberInviteInput = z.object({ email, roles: z.array(damRole).check(z.minLength(1)) });

export const eventDto = z.object({
  id,
  type: z.string(),
  /** The sentence for the activity list, without the person's name. */
  text: z.string(),
  person: z.nullable(personRef),
  drawingId: z.nullable(id),
  netId: z.nullable(id),
  at: timestamp,
});
export type EventDto = z.infer<typeof eventDto>;

/**
 * `GET /waiting`: what waits for the reader: first what has a day, then what must be answered before acceptance, then the
 * newest.
 */
export const waitingDto = z.object({
  items: z.array(
    z.object({
      kind: z.enum(['check', 'answer', 'named', 'unread', 'returned', 'calibrate', 'trace']),
      text: z.string(),
      detail: z.string(),
      damId: id,
      damName: z.string(),
      drawingId: z.nullable(id),
      netId: z.nullable(id),
      revisionId: z.nullable(id),
      /** The newest of the notes that wait. */
      noteId: z.nullable(id),
      /** Day by which the check is due. */
      dueOn: z.nullable(z.iso.date()),
      /** Of notes: a reviewer wants an answer before acceptance. */
      mustAnswer: z.boolean(),
      at: timestamp,
    }),
  ),
});
export type WaitingDto = z.infer<typeof waitingDto>;
