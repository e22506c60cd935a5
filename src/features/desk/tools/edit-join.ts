import { plainText } from '#client/lib/figures.ts';
import { editLabels, editNotices, editRefusals } from '#client/text/editing-lines.ts';
import { joined, widestGap } from '#shared/compute/geometry/edit-lines/join.ts';
import type { TracedLine } from '#shared/contract/document.ts';
import { selectOne } from '../model/selection.ts';
import type { EditResult, LineThing } from './edit-result.ts';
import { keptPlace, notesAbout } from './edit-things.ts';
import type { ToolContext } from './tool-types.ts';

/** A line has no more points than the document allows. */
export const MOST_POINTS = 5000;

/**
 * Joins two lines of one kind at their nearest ends. The first keeps its id and direction, unless only the other one has
 * notes: then it keeps that one's. What was typed for either stays; what contradicts is refused.
 */
export function joinLines(line: LineThing, other: LineThing, context: ToolContext): EditResult {
  const made = joined(line.value.points, other.value.points);
  if (made === null) return { refusal: editRefusals.tooFewPoints };
  const refusal =
    refusalToJoin(line.value, other.value) ??
    refusalOfGap(made.gap, widestGap(line.value.points, other.value.points)) ??
    (made.points.length > MOST_POINTS ? editRefusals.joinTooMany(plainText(MOST_POINTS)) : null);
  if (refusal !== null) return { refusal };
  const [own, others] = [notesAbout(line.id, context).length, notesAbout(other.id, context).length];
  const [kept, gone] = own === 0 && others > 0 ? [other, line] : [line, other];
  const value: TracedLine = {
    ...line.value,
    ...agreed(line.value, other.value),
    points: made.points.map(([x, y]) => [x, y]),
  };
  return {
    label: editLabels.join(value),
    ops: [
      { op: 'put', entityId: kept.id, value },
      { op: 'remove', entityId: gone.id },
    ],
    selection: selectOne('line', kept.id),
    notice: own > 0 && others > 0 ? editNotices.noteOnJoined : null,
    sketches: [{ kind: 'gained', points: made.bridge.map(keptPlace) }],
  };
}

function refusalToJoin(a: TracedLine, b: TracedLine): string | null {
  if (a.line !== b.line) return editRefusals.joinKinds(a, b);
  if (a.water !== null && b.water !== null && a.water !== b.water) return editRefusals.joinWaters;
  if (a.head !== null && b.head !== null && a.head !== b.head) {
    return editRefusals.joinHeads(plainText(a.head), plainText(b.head));
  }
  if (a.drops !== null && b.drops !== null && a.drops !== b.drops) {
    return editRefusals.joinDrops(plainText(a.drops), plainText(b.drops));
  }
  // A line has one head: a typed head and a typed count cannot both stand.
  return (a.head ?? b.head) !== null && (a.drops ?? b.drops) !== null ? editRefusals.joinHeadAndDrops : null;
}

function refusalOfGap(gap: number, most: number): string | null {
  return gap > most ? editRefusals.joinTooFar(plainText(gap, 3), plainText(most, 3)) : null;
}

/** What both lines say together; a line joined of a finished and an unfinished one is still to be finished. */
function agreed(a: TracedLine, b: TracedLine): Partial<TracedLine> {
  return {
    name: a.name || b.name,
    water: a.water ?? b.water,
    head: a.head ?? b.head,
    drops: a.drops ?? b.drops,
    finished: a.finished && b.finished,
    origin: a.origin === b.origin ? a.origin : 'traced',
  };
}
