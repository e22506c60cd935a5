import { measuredText as text } from '#client/text/measured.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Edit } from './schedule-edits.ts';

type Point = EntityOf<'readingPoint'>;
export type Measured = NonNullable<Point['measured']>;

/** Changes what was measured at a point; null while there is no figure to change. */
export function changeMeasured(id: string, point: Point, changes: Partial<Measured>): Edit | null {
  const before = point.measured;
  const value = changes.value ?? before?.value;
  if (value === undefined) return null;
  const base: Measured = before ?? { value, as: 'totalHead', plusMinus: null, on: '' };
  const measured = { ...base, ...changes, value };
  return {
    label: text.labels.changed(point.name),
    ops: [{ op: 'put', entityId: id, value: { ...point, measured } }],
  };
}

export function clearMeasured(id: string, point: Point): Edit {
  return {
    label: text.labels.cleared(point.name),
    ops: [{ op: 'put', entityId: id, value: { ...point, measured: null } }],
  };
}

export function changeTip(id: string, point: Point, elevationPlusMinus: number | null): Edit {
  return {
    label: text.labels.tip(point.name),
    ops: [{ op: 'put', entityId: id, value: { ...point, elevationPlusMinus } }],
  };
}
