import { editLabels, editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { alongNearest, meetingsAlong } from '#shared/compute/geometry/edit-lines/cut.ts';
import { type Extended, endsOn, extendedAt, extendedTo } from '#shared/compute/geometry/edit-lines/extend.ts';
import { selectOne } from '../model/selection.ts';
import { isOn, otherLines } from './edit-others.ts';
import { type EditResult, type LineEdit, type LineThing, lengthOf, withPoints } from './edit-result.ts';
import { keptPlace } from './edit-things.ts';
import type { ToolContext } from './tool-types.ts';

/** Extends a line straight on to the other one pointed at, or its end that is pointed at to the first line it meets. */
export function extend(
  line: LineThing,
  other: LineThing | null,
  at: SheetPx,
  context: ToolContext,
): EditResult {
  const { points } = line.value;
  const { widthPx, heightPx } = context.document.sheet;
  const reach = 2 * Math.hypot(widthPx, heightPx);
  if (other !== null) {
    const target = { id: other.id, points: other.value.points };
    const extended = extendedTo(points, target, reach);
    if (extended !== null) return extendResult(line, extended);
    if (endsOn(points, target.points)) return { refusal: editRefusals.extendEndsOn(line.value, other.value) };
    const crosses = meetingsAlong(points, [target.points]).length > 0;
    return {
      refusal: crosses
        ? editRefusals.extendCrosses(line.value, other.value)
        : editRefusals.extendMisses(other.value),
    };
  }
  if (!isOn(line, at, context)) return { refusal: editRefusals.noLineThere };
  const along = alongNearest(points, at) ?? 0;
  const targets = otherLines(line.id, context).map(({ id, value }) => ({ id, points: value.points }));
  const extended = extendedAt(points, along < lengthOf(points) / 2, targets, reach);
  return extended === null ? { refusal: editRefusals.extendMeetsNone } : extendResult(line, extended);
}

function extendResult({ id, value }: LineThing, { points, added }: Extended): LineEdit {
  return {
    label: editLabels.extend(value),
    ops: [{ op: 'put', entityId: id, value: withPoints(value, points) }],
    selection: selectOne('line', id),
    notice: null,
    sketches: [
      { kind: 'gained', points: added.map(keptPlace) },
      { kind: 'place', points: [keptPlace(added[1])] },
    ],
  };
}
