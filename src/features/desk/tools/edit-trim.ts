import { editLabels, editNotices, editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { endPieceOff, type Trimmed, trimmedAt } from '#shared/compute/geometry/edit-lines/cut.ts';
import { selectOne } from '../model/selection.ts';
import { isOn, otherLines } from './edit-others.ts';
import { type EditResult, isNearer, type LineEdit, type LineThing, withPoints } from './edit-result.ts';
import { keptPlace, notesAbout } from './edit-things.ts';
import type { Modifiers, ToolContext } from './tool-types.ts';

/** Trims a line where the other one pointed at crosses it, or takes the end off that is pointed at itself. */
export function trim(
  line: LineThing,
  other: LineThing | null,
  at: SheetPx,
  keys: Modifiers,
  context: ToolContext,
): EditResult {
  const { points } = line.value;
  if (other !== null) {
    const trimmed = trimmedAt(points, other.value.points, at, keys.shift);
    if (trimmed === null) return { refusal: editRefusals.trimNoMeeting(line.value, other.value) };
    return trimResult(line, trimmed, context);
  }
  if (!isOn(line, at, context)) return { refusal: editRefusals.noLineThere };
  const cutters = otherLines(line.id, context).map(({ value }) => value.points);
  const trimmed = endPieceOff(points, cutters, at);
  if (trimmed === null) return { refusal: editRefusals.trimMeetsNone(line.value) };
  return trimmed === 'between' ? { refusal: editRefusals.trimBetween } : trimResult(line, trimmed, context);
}

function trimResult({ id, value }: LineThing, { kept, gone }: Trimmed, context: ToolContext): LineEdit {
  const cut = kept.at(-1) === gone[0] ? gone[0] : kept[0];
  const orphaned = notesAbout(id, context).some((at) => isNearer(at, gone, kept));
  return {
    label: editLabels.trim(value),
    ops: [{ op: 'put', entityId: id, value: withPoints(value, kept) }],
    selection: selectOne('line', id),
    notice: orphaned ? editNotices.noteOnCutOff : null,
    sketches: [
      { kind: 'lost', points: gone.map(keptPlace) },
      { kind: 'place', points: cut === undefined ? [] : [keptPlace(cut)] },
    ],
  };
}
