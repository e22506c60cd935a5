import type {
  DocumentEntity,
  EntityKind,
  EntityOf,
  FlowNetDocument,
  LineKind,
} from '#shared/contract/document.ts';
import { entityIdOf } from '#tests/support/exact-nets/exact-net-document.ts';

/** The document with every entity of one kind changed; a change of null takes the entity away. */
export function changed<K extends EntityKind>(
  document: FlowNetDocument,
  kind: K,
  change: (value: EntityOf<K>, index: number) => EntityOf<K> | null,
): FlowNetDocument {
  let index = -1;
  const entities = Object.values(document.entities).flatMap((entity) => {
    if (entity.value.kind !== kind) return [entity];
    index += 1;
    const value = change(entity.value as EntityOf<K>, index);
    return value === null ? [] : [{ ...entity, value }];
  });
  return { ...document, entities: Object.fromEntries(entities.map((entity) => [entity.id, entity])) };
}

/** As `changed`, for the traced lines of one sort, counted in the order of drawing. */
export function withLines(
  document: FlowNetDocument,
  line: LineKind,
  change: (value: EntityOf<'line'>, index: number) => EntityOf<'line'> | null,
): FlowNetDocument {
  let index = -1;
  return changed(document, 'line', (value) => {
    if (value.line !== line) return value;
    index += 1;
    return change(value, index);
  });
}

/** The document with entities added at the end. */
export function withAdded(document: FlowNetDocument, ...values: DocumentEntity[]): FlowNetDocument {
  const start = 0x10000 + Object.keys(document.entities).length;
  const added = values.map((value, i) => ({ id: entityIdOf(start + i), version: 1, value }));
  return {
    ...document,
    entities: { ...document.entities, ...Object.fromEntries(added.map((entity) => [entity.id, entity])) },
  };
}
