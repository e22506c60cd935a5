import {
  type DocumentEntity,
  type EntityKind,
  SECTION_KINDS,
  SINGLE_KINDS,
  type VersionedEntity,
} from '#shared/contract/document.ts';
import type { NetOp } from '#shared/contract/nets.ts';

/** An entity as the server holds it; a removed one is a tombstone that keeps its last value. */
export interface HeldEntity {
  entityId: string;
  kind: EntityKind;
  version: number;
  value: DocumentEntity;
  removed: boolean;
  changedBy: string;
}

export interface JudgedOp {
  entityId: string;
  outcome: 'applied' | 'conflict';
  version: number;
  current: VersionedEntity | null;
  changedBy: string | null;
}

/** Whether entities of this kind belong to the section rather than to one of its nets. */
export const isSectionKind = (kind: EntityKind): boolean => SECTION_KINDS.includes(kind);

/**
 * What no right client sends: an entity that becomes another kind, a second one of a single kind, a single one
 * removed. Such a batch is refused whole; an op that only came too late is a conflict and no fault.
 */
export function faultsOf(
  ops: readonly NetOp[],
  held: ReadonlyMap<string, HeldEntity>,
): Array<{ path: string; message: string }> {
  const kinds = new Map([...held.values()].map((entity) => [entity.entityId, entity.kind]));
  const faults: Array<{ path: string; message: string }> = [];
  ops.forEach((op, index) => {
    const message = faultOf(op, kinds);
    if (message) faults.push({ path: `ops.${index}`, message });
    else if (op.op === 'put') kinds.set(op.entityId, op.value.kind);
  });
  return faults;
}

function faultOf(op: NetOp, kinds: ReadonlyMap<string, EntityKind>): string | null {
  const known = kinds.get(op.entityId);
  const kind = op.op === 'put' ? op.value.kind : known;
  if (!kind) return null;
  if (known && known !== kind) return `A ${known} cannot become a ${kind}. Remove it and make a new one.`;
  if (!SINGLE_KINDS.includes(kind)) return null;
  if (op.op === 'remove') return `A net always has one ${kind}; change it instead of removing it.`;
  if (!known) return `A net has exactly one ${kind}; change that one instead of adding another.`;
  return null;
}

/**
 * Applies the ops in order to what is held. An op made on another version than the held one is a conflict and leaves
 * its entity as it is; the others are applied. `changed` are the entities to write, each in its last state.
 */
export function judgeOps(
  ops: readonly NetOp[],
  held: ReadonlyMap<string, HeldEntity>,
  actorId: string,
): { outcomes: JudgedOp[]; changed: HeldEntity[] } {
  const now = new Map(held);
  const changed = new Map<string, HeldEntity>();
  const outcomes = ops.map((op) => {
    const before = now.get(op.entityId) ?? null;
    if (op.baseVersion !== (before?.version ?? 0)) return conflictWith(op, before);
    const after = applied(op, before, actorId);
    // Removing what is removed already changes nothing and is no conflict either.
    if (after !== before && after) {
      now.set(op.entityId, after);
      changed.set(op.entityId, after);
    }
    return appliedAs(op, after);
  });
  return { outcomes, changed: [...changed.values()] };
}

function applied(op: NetOp, before: HeldEntity | null, changedBy: string): HeldEntity | null {
  const version = (before?.version ?? 0) + 1;
  const { entityId } = op;
  if (op.op === 'put') {
    return { entityId, kind: op.value.kind, version, value: op.value, removed: false, changedBy };
  }
  return before === null || before.removed ? before : { ...before, version, removed: true, changedBy };
}

const appliedAs = (op: NetOp, after: HeldEntity | null): JudgedOp => ({
  entityId: op.entityId,
  outcome: 'applied',
  version: after?.version ?? 0,
  current: null,
  changedBy: null,
});

const conflictWith = (op: NetOp, before: HeldEntity | null): JudgedOp => ({
  entityId: op.entityId,
  outcome: 'conflict',
  version: before?.version ?? 0,
  current:
    before && !before.removed ? { id: before.entityId, version: before.version, value: before.value } : null,
  changedBy: before?.changedBy ?? null,
});
