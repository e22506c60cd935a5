import { v7 as uuidv7 } from 'uuid';
import {
  type DocumentEntity,
  type FlowNetDocument,
  SINGLE_KINDS,
  singleOf,
  type VersionedEntity,
} from '#shared/contract/document.ts';
import type { NetOp } from '#shared/contract/nets.ts';
import { isSectionKind } from './command-ops.ts';

/**
 * What makes of a new net the net of a file. Entities of which a net has one each become those the net was made with;
 * the others keep their ids unless one of these is `taken`: then all get new ones, in the order of the old, because
 * lines and known points are read in the order of their ids.
 */
export function opsOfFile(
  file: FlowNetDocument,
  net: FlowNetDocument,
  { taken, withSetOut }: { taken: ReadonlySet<string>; withSetOut: boolean },
): NetOp[] {
  const entities = entitiesInOrder(file).filter(({ value }) => withSetOut || !isSectionKind(value.kind));
  const isClash = entities.some(({ id }) => taken.has(id));
  const ids = new Map(entities.map(({ id }) => [id, isClash ? uuidv7() : id]));
  return entities.map(({ id, value }): NetOp => {
    const held = SINGLE_KINDS.includes(value.kind) ? singleOf(net, value.kind) : null;
    return {
      op: 'put',
      entityId: held?.id ?? ids.get(id) ?? id,
      baseVersion: held?.version ?? 0,
      value: withIds(value, ids),
    };
  });
}

/** Entities in the order of their ids, which are compared in small letters. */
function entitiesInOrder(file: FlowNetDocument): VersionedEntity[] {
  return Object.values(file.entities)
    .map((entity) => ({ ...entity, id: entity.id.toLowerCase() }))
    .sort((a, b) => (a.id < b.id ? -1 : 1));
}

/** The value with what it names by id named by the new ids. */
export function withIds(value: DocumentEntity, ids: ReadonlyMap<string, string>): DocumentEntity {
  if (value.kind !== 'netCount' || value.countedIn === null) return value;
  return { ...value, countedIn: ids.get(value.countedIn.toLowerCase()) ?? value.countedIn };
}
