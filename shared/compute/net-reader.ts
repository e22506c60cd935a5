import { FieldMemory } from '#shared/compute/field/field-memory.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument, VersionedEntity } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Reads one net again and again while it is worked on. */
export type NetReader = { read(document: FlowNetDocument): NetReading };

/**
 * A reader that remembers what it read: lines that are the same to the last bit are not smoothed and measured again,
 * and only the strips that a change touches are solved again. Its readings are those of `readNet`. One reader for one
 * net; it keeps some megabytes.
 */
export function createNetReader(): NetReader {
  const memory = new FieldMemory();
  let last: FlowNetDocument['entities'] = {};
  return {
    read(document) {
      const entities = Object.fromEntries(
        Object.entries(document.entities).map(([id, entity]) => [id, sameAsBefore(entity, last[id])]),
      );
      last = entities;
      return readNet({ ...document, entities }, memory);
    },
  };
}

/** The entity with the value it had before where that is equal: what is kept for it is then found again. */
function sameAsBefore(entity: VersionedEntity, before: VersionedEntity | undefined): VersionedEntity {
  if (before === undefined || !equalValues(entity.value, before.value)) return entity;
  return { ...entity, value: before.value };
}

/** True when two JSON values are equal to the last bit, whatever the order of their keys. */
function equalValues(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) || Array.isArray(b)) {
    if (!Array.isArray(a) || !Array.isArray(b) || a.length !== b.length) return false;
    return a.every((item, i) => equalValues(item, b[i]));
  }
  const [left, right] = [a as Record<string, unknown>, b as Record<string, unknown>];
  const keys = Object.keys(left);
  return (
    keys.length === Object.keys(right).length &&
    keys.every((key) => Object.hasOwn(right, key) && equalValues(left[key], right[key]))
  );
}
