import type { DocumentEntity, FlowNetDocument, VersionedEntity } from '#shared/contract/document.ts';
import { sameValue } from './same-value.ts';

/** One change as tools and forms ask for it; versions are the store's affair. */
export type LocalOp =
  | { op: 'put'; entityId: string; value: DocumentEntity }
  | { op: 'remove'; entityId: string };

export type Applied = {
  document: FlowNetDocument;
  /** Ops that really changed something, in order. */
  ops: LocalOp[];
  /** Ops that take them back, in the order to apply them. */
  inverse: LocalOp[];
};

/** The value of an entity; null when the document does not hold it. */
export function entityValue(document: FlowNetDocument, entityId: string): DocumentEntity | null {
  return document.entities[entityId]?.value ?? null;
}

/**
 * Applies ops to a document and gives the ops that take them back. The document given is left as it is; entities
 * keep the version they had, 0 for one the server does not know yet. Ops that change nothing are left out.
 * @throws when a put would change the kind of an entity, which no tool may ask for.
 */
export function applyOps(
  document: FlowNetDocument,
  ops: readonly LocalOp[],
  versionOf: (entityId: string) => number = () => 0,
): Applied {
  const entities: Record<string, VersionedEntity> = { ...document.entities };
  const done: LocalOp[] = [];
  const inverse: LocalOp[] = [];
  for (const op of ops) {
    const before = entities[op.entityId];
    if (op.op === 'remove') {
      if (before === undefined) continue;
      delete entities[op.entityId];
    } else {
      if (before !== undefined && sameValue(before.value, op.value)) continue;
      refuseOtherKind(before, op.value);
      const version = before?.version ?? versionOf(op.entityId);
      entities[op.entityId] = { id: op.entityId, version, value: op.value };
    }
    done.push(op);
    inverse.unshift(takeBack(op.entityId, before));
  }
  return { document: done.length === 0 ? document : { ...document, entities }, ops: done, inverse };
}

function refuseOtherKind(before: VersionedEntity | undefined, value: DocumentEntity): void {
  if (before !== undefined && before.value.kind !== value.kind) {
    throw new Error(`An entity of kind ${before.value.kind} cannot become ${value.kind}.`);
  }
}

function takeBack(entityId: string, before: VersionedEntity | undefined): LocalOp {
  return before === undefined ? { op: 'remove', entityId } : { op: 'put', entityId, value: before.value };
}
