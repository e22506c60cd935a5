import { editLabels, editNotices, editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import {
  alongNearest,
  type Cut,
  cutAt,
  cutAtVertex,
  distancesOf,
  endPieceOff,
  meetingsAlong,
  type Trimmed,
  trimmedAt,
} from '#shared/compute/geometry/edit-lines/cut.ts';
import { type Extended, endsOn, extendedAt, extendedTo } from '#shared/compute/geometry/edit-lines/extend.ts';
import { nearestOnLines, nearestVertex, segmentAt } from '#shared/compute/geometry/hit-test.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { entitiesOf, type SheetPoint, type TracedLine } from '#shared/contract/document.ts';
import type { LocalOp } from '../model/document-ops.ts';
import { type Selection, selectOne } from '../model/selection.ts';
import type { Sketch } from '../model/tool-overlay.ts';
import { joinLines } from './edit-join.ts';
import { keptPlace, notesAbout, type Thing } from './edit-things.ts';
import { isHidden, reachOf } from './pick.ts';
import type { Modifiers, ToolContext } from './tool-types.ts';

/** What an edit of a line would do: shown before the click, carried out by it. */
export type LineEdit = {
  readonly label: string;
  readonly ops: LocalOp[];
  readonly selection: Selection;
  /** What is told afterwards, of notes whose line has changed. */
  readonly notice: string | null;
  readonly sketches: readonly Sketch[];
};

export type Refusal = { readonly refusal: string };
export type EditResult = LineEdit | Refusal;
export type LineThing = Thing<TracedLine>;

export const isRefusal = (result: EditResult): result is Refusal => 'refusal' in result;

/** What a click at a place would do to the chosen line. */
export function editAt(
  op: 'split' | 'join' | 'trim' | 'extend',
  line: LineThing,
  at: SheetPx,
  keys: Modifiers,
  context: ToolContext,
): EditResult {
  if (line.value.points.length < 2) return { refusal: editRefusals.tooFewPoints };
  if (op === 'split') return splitNear(line, at, context);
  const other = otherLineAt(line.id, at, context);
  if (op === 'trim') return trim(line, other, at, keys, context);
  if (op === 'extend') return extend(line, other, at, context);
  if (other !== null) return joinLines(line, other, context);
  return { refusal: isOn(line, at, context) ? editRefusals.joinSelf : editRefusals.noLineThere };
}

/** The shown line nearest to a place within reach, the chosen one left out; locked ones may be met too. */
function otherLineAt(except: string, at: SheetPx, context: ToolContext): LineThing | null {
  const others = otherLines(except, context);
  const hit = nearestOnLines(
    others.map(({ id, value }) => ({ id, points: value.points })),
    at,
    reachOf(context),
  );
  return hit === null ? null : (others.find(({ id }) => id === hit.id) ?? null);
}

function otherLines(except: string, context: ToolContext): LineThing[] {
  return entitiesOf(context.document, 'line').filter(
    ({ id, value }) => id !== except && !isHidden(context, value) && value.points.length > 1,
  );
}

function isOn(line: LineThing, at: SheetPx, context: ToolContext): boolean {
  return segmentAt(line.value.points, at, reachOf(context)) !== null;
}

/** Splits a line at the vertex near a place, else at the place itself. */
function splitNear(line: LineThing, at: SheetPx, context: ToolContext): EditResult {
  const { id, value } = line;
  const place = segmentAt(value.points, at, reachOf(context));
  if (place === null) return { refusal: editRefusals.splitOnLine(value) };
  const vertex = nearestVertex([{ id, points: value.points }], at, reachOf(context) / 2);
  const onSegment = value.points.slice(0, place.segment + 1);
  const s =
    (distancesOf(onSegment).at(-1) ?? 0) +
    Math.hypot(place.at[0] - onSegment.at(-1)![0], place.at[1] - onSegment.at(-1)![1]);
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

function trim(
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

function extend(line: LineThing, other: LineThing | null, at: SheetPx, context: ToolContext): EditResult {
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

/** A line through other points; those it had already are kept as they are, new ones to the hundredth of a pixel. */
export function withPoints(value: TracedLine, points: readonly Pair[]): TracedLine {
  const known = new Set<Pair>(value.points);
  return {
    ...value,
    points: points.map((point) => (known.has(point) ? (point as SheetPoint) : keptPlace(point))),
  };
}

const lengthOf = (points: readonly Pair[]): number => distancesOf(points).at(-1) ?? 0;

function isNearer(at: Pair, first: readonly Pair[], second: readonly Pair[]): boolean {
  const away = (points: readonly Pair[]) => segmentAt(points, at, Number.POSITIVE_INFINITY)?.distance ?? 0;
  return away(first) < away(second);
}
