import { editLabels, editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { type Cut, cutAt, cutAtVertex } from '#shared/compute/geometry/edit-lines/cut.ts';
import { nearestVertex, segmentAt } from '#shared/compute/geometry/hit-test.ts';
import { selectOne } from '../model/selection.ts';
import { type EditResult, isNearer, type LineThing, lengthOf, withPoints } from './edit-result.ts';
import { keptPlace, notesAbout } from './edit-things.ts';
import { reachOf } from './pick.ts';
import type { ToolContext } from './tool-types.ts';

/** Splits a line at the vertex near a place, else at the place itself. */
export function splitNear(line: LineThing, at: SheetPx, context: ToolContext): EditResult {
  const { id, value } = line;
  const place = segmentAt(value.points, at, reachOf(context));
  if (place === null) return { refusal: editRefusals.splitOnLine(value) };
  const vertex = nearestVertex([{ id, points: value.points }], at, reachOf(context) / 2);
  const before = value.points.slice(0, place.segment + 1);
  const s = lengthOf(before) + Math.hypot(place.at[0] - before.at(-1)![0], place.at[1] - before.at(-1)![1]);
  const cut = (vertex === null ? null : cutAtVertex(value.points, vertex.index)) ?? cutAt(value.points, s);
  return split(line, cut, context);
}

/** Splits a line at one of its vertices. */
export function splitAtVertex(line: LineThing, index: number, context: ToolContext): EditResult {
  return split(line, cutAtVertex(line.value.points, index), context);
}

/** The piece that more of the line's notes are about keeps its id, of pieces with as many the longer one. */
function split(line: LineThing, cut: Cut | null, context: ToolContext): EditResult {
  if (cut === null) return { refusal: editRefusals.splitAtEnd };
  const { id, value } = line;
  const before = withPoints(value, cut.before);
  const after = withPoints(value, cut.after);
  const notes = notesAbout(id, context).map((at) => isNearer(at, cut.before, cut.after));
  const balance = notes.filter(Boolean).length - notes.filter((near) => !near).length;
  const keepsBefore = balance === 0 ? lengthOf(cut.before) >= lengthOf(cut.after) : balance > 0;
  const [kept, added] = keepsBefore ? [before, after] : [after, before];
  return {
    label: editLabels.split(value),
    ops: [
      { op: 'put', entityId: id, value: kept },
      { op: 'put', entityId: context.newId(), value: added },
    ],
    selection: selectOne('line', id),
    notice: null,
    sketches: [{ kind: 'place', points: [keptPlace(cut.after[0]!)] }],
  };
}
