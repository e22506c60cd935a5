import { FieldMemory } from '#shared/compute/field/field-memory.ts';
import { type HeadAtPlace, headAtPlace } from '#shared/compute/net/head-at-place.ts';
import { type KeptNet, readAndKeep } from '#shared/compute/read-net.ts';
import { type PointsRead, rereadPoints, type SmallChange } from '#shared/compute/reread-points.ts';
import type { FlowNetDocument, SheetPoint, VersionedEntity } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Reads one net again and again while it is worked on. */
export type NetReader = {
  /** The whole reading, that of `readNet`. */
  read(document: FlowNetDocument): NetReading;
  /**
   * The points ahead of the whole reading, which is to follow; see `rereadPoints`. Null when more has changed since the
   * last whole reading than reading points and the vertices of one equipotential. Takes no document for another that
   * was changed in place.
   */
  readPoints(document: FlowNetDocument): PointsRead | null;
  /** The head at a place of the sheet by the net of the last whole reading; null where that gives none. */
  headAt(place: SheetPoint): HeadAtPlace | null;
};

/**
 * A reader that remembers what it read: lines that are the same to the last bit are not smoothed and measured again,
 * and only the strips that a change touches are solved again. Its readings are those of `readNet`. One reader for one
 * net; it keeps some megabytes.
 */
export function createNetReader(): NetReader {
  const memory = new FieldMemory();
  let last: FlowNetDocument | null = null;
  let kept: KeptNet = null;
  return {
    read(document) {
      const now = likeBefore(document, last);
      const read = readAndKeep(now, memory);
      last = now;
      kept = read.kept;
      return read.reading;
    },
    readPoints(document) {
      if (last === null || kept === null) return null;
      const now = likeBefore(document, last);
      const change = smallChange(last, now);
      return change && rereadPoints(now, change, kept, memory);
    },
    headAt: (place) => (kept === null ? null : headAtPlace(place, kept.prepared)),
  };
}

/** What of a net has changed when it is no more than reading points and the vertices of at most one equipotential. */
function smallChange(before: FlowNetDocument, now: FlowNetDocument): SmallChange | null {
  if (!equalValues({ ...before, entities: null }, { ...now, entities: null })) return null;
  const ids = new Set([...Object.keys(before.entities), ...Object.keys(now.entities)]);
  const changed = [...ids].filter((id) => before.entities[id]?.value !== now.entities[id]?.value);
  const valuesOf = (id: string) => [before.entities[id]?.value, now.entities[id]?.value] as const;
  const others = changed.filter((id) =>
    valuesOf(id).some((value) => value !== undefined && value.kind !== 'readingPoint'),
  );
  if (others.length > 1 || !others.every((id) => isMovedEquipotential(...valuesOf(id)))) return null;
  return { changed, moved: others[0] ?? null };
}

function isMovedEquipotential(from: VersionedEntity['value'] | undefined, to: typeof from): boolean {
  if (from?.kind !== 'line' || to?.kind !== 'line') return false;
  return from.line === 'equipotential' && equalValues({ ...from, points: null }, { ...to, points: null });
}

/** The document with every entity that is equal to one of before as it was: what is kept for it is then found again. */
function likeBefore(document: FlowNetDocument, before: FlowNetDocument | null): FlowNetDocument {
  const entities = Object.entries(document.entities).map(
    ([id, entity]) => [id, sameAsBefore(entity, before?.entities[id])] as const,
  );
  return { ...document, entities: Object.fromEntries(entities) };
}

function sameAsBefore(entity: VersionedEntity, before: VersionedEntity | undefined): VersionedEntity {
  if (before === undefined || !equalValues(entity.value, before.value)) return entity;
  return { ...entity, value: before.value };
}

/** True when two JSON values are equal to the last bit, whatever the order of their keys. */
function equalValues(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (Array.isArray(a) || Array.isArray(b)) return Array.isArray(a) && Array.isArray(b) && equalLists(a, b);
  const [left, right] = [a as Record<string, unknown>, b as Record<string, unknown>];
  const keys = Object.keys(left);
  return (
    keys.length === Object.keys(right).length &&
    keys.every((key) => Object.hasOwn(right, key) && equalValues(left[key], right[key]))
  );
}

/** A loop, since this is asked of every vertex of a net. */
function equalLists(a: readonly unknown[], b: readonly unknown[]): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i += 1) {
    if (!equalValues(a[i], b[i])) return false;
  }
  return true;
}
