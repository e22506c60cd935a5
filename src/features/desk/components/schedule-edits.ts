import type { LocalOp } from '#client/features/desk/model/document-ops.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import { type EntityOf, UNSAID } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';

export interface Edit {
  label: string;
  ops: LocalOp[];
}

type ReadingPoint = EntityOf<'readingPoint'>;

export function renamePoint(id: string, point: ReadingPoint, name: string): Edit {
  return {
    label: text.labels.renamed(point.name, name),
    ops: [{ op: 'put', entityId: id, value: { ...point, name } }],
  };
}

/**
 * Gives a point the coordinates typed. A point clicked on the sheet becomes a typed one: from then on it keeps its
 * place in the section when the known points are corrected. The coordinate not typed is the one read so far.
 */
export function typePlace(
  point: ReadingPoint,
  reading: PointReading,
  typed: { offset?: number; elevation?: number },
): Edit | null {
  const offset = typed.offset ?? reading.offset;
  const elevation = typed.elevation ?? reading.elevation;
  if (offset === null || elevation === null) return null;
  const value: ReadingPoint = { ...point, place: { on: 'section', offset, elevation } };
  return { label: text.labels.moved(point.name), ops: [{ op: 'put', entityId: reading.id, value }] };
}

export function removePoint(id: string, name: string): Edit {
  return { label: text.labels.removed(name), ops: [{ op: 'remove', entityId: id }] };
}

/** A point typed by its coordinates, last in the schedule. */
export function addTypedPoint(
  id: string,
  typed: { name: string; offset: number; elevation: number },
  points: readonly PointReading[],
): Edit {
  const order = Math.max(0, ...points.map((point) => point.order)) + 1;
  const { name, offset, elevation } = typed;
  const value: ReadingPoint = {
    kind: 'readingPoint',
    ...UNSAID.readingPoint,
    name,
    order,
    place: { on: 'section', offset, elevation },
  };
  return { label: text.labels.added(name), ops: [{ op: 'put', entityId: id, value }] };
}
