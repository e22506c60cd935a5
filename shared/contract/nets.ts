import * as z from 'zod/mini';
import { damAction } from './actions.ts';
import { id, personRef, requiredText, timestamp } from './common.ts';
import { documentEntity, entityId, flowNetDocument, versionedEntity } from './document.ts';
import { netSummary, sectionDto, sheetDto } from './drawings.ts';
import { MAX_OPS_PER_BATCH } from './limits.ts';

const frame = z.nullable(z.tuple([z.number(), z.number(), z.number(), z.number()]));

export const sectionInput = z.object({
  id,
  name: requiredText,
  chainage: z.string().check(z.trim(), z.maxLength(60)),
  frame,
});
export const sectionPatch = z.partial(z.omit(sectionInput, { id: true }));

/** A new net of a section; the id is made where the net is made. */
export const netInput = z.object({ id, name: requiredText });
export const netPatch = z.object({ name: requiredText });

/** `GET /nets/:netId`: all the desk needs to open. */
export const netDetailDto = z.object({
  net: netSummary,
  section: sectionDto,
  sheet: sheetDto,
  drawing: z.object({ id, number: z.string(), title: z.string(), revision: z.string() }),
  dam: z.object({ id, name: z.string(), datum: z.string(), fullSupplyLevel: z.nullable(z.number()) }),
  document: flowNetDocument,
  /** Number of the newest change contained in `document`. */
  changeNumber: z.number(),
  drawnBy: z.array(personRef),
  updatedAt: timestamp,
  /** How many revisions were sent so far. */
  revisionCount: z.number(),
  can: z.array(damAction),
});
export type NetDetailDto = z.infer<typeof netDetailDto>;

/** The database compares ids in small letters; a capital must not make a second entity of one. */
const opEntityId = entityId.check(z.toLowerCase());

/**
 * One change of one entity. `baseVersion` is the version it was made on: 0 for a new entity. Removing keeps the
 * row as a tombstone, so that a stale change of it is a conflict and not a resurrection; `put` on the tombstone's
 * version brings it back (undo of a removal).
 */
export const netOp = z.discriminatedUnion('op', [
  z.object({
    op: z.literal('put'),
    entityId: opEntityId,
    baseVersion: z.number().check(z.int(), z.nonnegative()),
    value: documentEntity,
  }),
  z.object({
    op: z.literal('remove'),
    entityId: opEntityId,
    baseVersion: z.number().check(z.int(), z.positive()),
  }),
]);
export type NetOp = z.infer<typeof netOp>;

/** A batch of commands, idempotent by (clientId, seq). */
export const commandBatch = z.object({
  clientId: id,
  seq: z.number().check(z.int(), z.positive()),
  /** What the person did, for the activity list: "moved a vertex of line 3". */
  label: z.string().check(z.maxLength(200)),
  ops: z.array(netOp).check(z.minLength(1), z.maxLength(MAX_OPS_PER_BATCH)),
});
export type CommandBatch = z.infer<typeof commandBatch>;

/** Outcome of one op, in the order sent. A conflict carries the server's entity (null when it was removed). */
export const opOutcome = z.object({
  entityId,
  outcome: z.enum(['applied', 'conflict']),
  /** Version now held by the server; 0 when it never existed. */
  version: z.number(),
  current: z.nullable(versionedEntity),
  changedBy: z.nullable(personRef),
});
export type OpOutcome = z.infer<typeof opOutcome>;

/** 200 when all was applied, 409 with the same body when some entity conflicted; the rest is applied all the same. */
export const commandResult = z.object({
  changeNumber: z.number(),
  outcomes: z.array(opOutcome),
});
export type CommandResult = z.infer<typeof commandResult>;

/** `GET /nets/:netId/changes?since=N`: entities changed after change N, tombstones as `null` values. */
export const changesQuery = z.object({ since: z.coerce.number().check(z.int(), z.nonnegative()) });
export const changesDto = z.object({
  changeNumber: z.number(),
  entities: z.array(
    z.object({
      id: entityId,
      version: z.number(),
      value: z.nullable(documentEntity),
      changedBy: z.nullable(personRef),
      clientId: z.nullable(id),
    }),
  ),
});
export type ChangesDto = z.infer<typeof changesDto>;
