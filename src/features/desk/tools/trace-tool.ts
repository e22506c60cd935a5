import { deskToolText as text } from '#client/text/desk-tools.ts';
import { drawingWayText } from '#client/text/drawing-ways.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { nearestVertex } from '#shared/compute/geometry/hit-test.ts';
import { entitiesOf, type SheetPoint, type TracedLine } from '#shared/contract/document.ts';
import type { Draft } from '../model/desk-state.ts';
import { NO_SELECTION, selectOne } from '../model/selection.ts';
import { constrained } from './constrain.ts';
import { growingEnd, keptPoint } from './line-points.ts';
import { reachOf } from './pick.ts';
import { snapAt } from './snap.ts';
import {
  type Modifiers,
  rest,
  stay,
  type ToolCommand,
  type ToolContext,
  type ToolEvent,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';
import { extendLine, lengthened } from './ways-of-drawing/extend-line.ts';
import {
  beginSketch,
  goOnSketching,
  isClick,
  type Sketching,
  strokePoints,
} from './ways-of-drawing/freehand-way.ts';
import { endOf, growingLine, grown } from './ways-of-drawing/growing.ts';
import { withoutLastClick } from './ways-of-drawing/take-back.ts';

/**
 * Draws lines click by click or stroke by stroke. The line under way is kept in the document from its first point on,
 * unfinished, so that it outlives a reload; the draft says which line it is and at which end it grows.
 */
export function traceStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  if (context.readOnly || context.choice === null) return stay(state);
  const line = draftLine(context);
  switch (event.type) {
    case 'press':
      return context.way === 'freehand' ? { state: beginSketch(event.at), commands: [] } : stay(state);
    case 'move':
      return state.at === 'sketching' ? { state: goOnSketching(state, event.at), commands: [] } : stay(state);
    case 'release':
      return state.at === 'sketching'
        ? addStroke(goOnSketching(state, event.at), event.at, event.keys, context)
        : stay(state);
    case 'abandonDrag':
      return rest();
    case 'click':
      if (event.count > 1) return line === null ? stay(state) : finish(line, context);
      return line === null ? begin(event.at, event.keys, context) : extend(event.at, event.keys, context);
    case 'finish':
      return line === null ? stay(state) : finish(line, context);
    case 'takeBack':
      return line === null ? stay(state) : takeBack(line, context);
    case 'cancel':
      return line === null ? rest({ do: 'tool', tool: 'select', boundary: null }) : abandon(line, context);
    default:
      return stay(state);
  }
}

/** Where the next point would go: on what it snaps to, else constrained while Shift is held, else at the pointer. */
export function nextPlace(at: SheetPx, keys: Modifiers, context: ToolContext): SheetPx {
  const snap = snapAt(context, at, keys, context.draft?.lineId ?? null);
  if (snap !== null) return snap.at;
  const line = draftLine(context);
  const from = line === null ? null : growingEnd(line, context.draft?.atStart ?? false);
  return keys.shift && from !== null ? constrained(context, sheetPx(...from), at) : at;
}

/** The line under way; null when none is. */
export function draftLine(context: ToolContext): TracedLine | null {
  const value = context.draft === null ? undefined : context.document.entities[context.draft.lineId]?.value;
  return value?.kind === 'line' ? value : null;
}

function begin(at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const open = keys.ctrl ? null : openEndAt(at, context);
  if (open !== null) {
    return rest({ do: 'select', selection: NO_SELECTION }, { do: 'draft', draft: open });
  }
  return rest(...begun([keptPoint(nextPlace(at, keys, context))], text.began, context));
}

/** The commands that begin a line with some points. */
function begun(
  points: SheetPoint[],
  label: (line: TracedLine) => string,
  context: ToolContext,
): ToolCommand[] {
  const entityId = context.newId();
  const { line, water } = context.choice!;
  const value: TracedLine = {
    kind: 'line',
    origin: 'traced',
    line,
    name: '',
    points,
    finished: false,
    water,
    head: null,
    drops: null,
  };
  const ends = points.length > 1 ? [points[0]!, points.at(-1)!] : points;
  const places = ends.map((at, i) => ({ at, way: i === 0 ? null : ('freehand' as const) }));
  return [
    { do: 'select', selection: NO_SELECTION },
    { do: 'run', label: label(value), ops: [{ op: 'put', entityId, value }] },
    { do: 'clicked', lineId: entityId, places },
    { do: 'draft', draft: { lineId: entityId, atStart: false } },
  ];
}

/** What a stroke drawn freehand adds; a hand that has hardly moved has clicked. */
function addStroke(sketch: Sketching, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  if (isClick(sketch, context)) return rest();
  const growing = growingLine(context);
  const open = growing === null && !keys.ctrl ? openEndAt(sketch.places[0]!, context) : null;
  const resumed = open === null ? context : { ...context, draft: open };
  const line = growing ?? growingLine(resumed);
  const ends = [nextPlace(sketch.places[0]!, keys, resumed), nextPlace(at, keys, resumed)] as const;
  const points = strokePoints(sketch, line === null ? null : endOf(line), ends, context);
  const label = (drawn: TracedLine) => drawingWayText.drewFreehand(text.lineWord(drawn));
  if (line === null) return points.length < 2 ? rest() : rest(...begun(points, label, context));
  const resume: ToolCommand[] = open === null ? [] : [{ do: 'draft', draft: open }];
  return rest(...resume, ...lengthened(line, [...line.points, ...points], 'freehand', label(line.line)));
}

/** The open end of an unfinished line of the same kind under the pointer, to go on with it. */
function openEndAt(at: SheetPx, context: ToolContext): Draft | null {
  const choice = context.choice!;
  const ends = entitiesOf(context.document, 'line')
    .filter(({ value }) => !value.finished && value.line === choice.line && value.water === choice.water)
    .map(({ id, value }) => ({
      id,
      points: [value.points.at(-1) ?? [0, 0], value.points[0] ?? [0, 0]] as const,
    }));
  const hit = nearestVertex(ends, at, reachOf(context));
  return hit === null ? null : { lineId: hit.id, atStart: hit.index === 1 };
}

function extend(at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const growing = growingLine(context);
  if (growing === null) return rest();
  const fixed = snapAt(context, at, keys, growing.lineId) !== null;
  return extendLine(growing, nextPlace(at, keys, context), fixed, context);
}

function finish(line: TracedLine, context: ToolContext): ToolStep {
  const { lineId } = context.draft!;
  if (line.points.length < 2) return abandon(line, context);
  const value = { ...line, finished: true };
  return rest(
    { do: 'run', label: text.finished(line), ops: [{ op: 'put', entityId: lineId, value }] },
    { do: 'draft', draft: null },
    { do: 'select', selection: selectOne('line', lineId) },
  );
}

function takeBack(line: TracedLine, context: ToolContext): ToolStep {
  const growing = growingLine(context);
  if (growing === null || line.points.length <= 1) return abandon(line, context);
  const value = grown(growing, withoutLastClick(growing));
  const { lineId } = growing;
  return rest({ do: 'run', label: text.tookPointBack(line), ops: [{ op: 'put', entityId: lineId, value }] });
}

function abandon(line: TracedLine, context: ToolContext): ToolStep {
  const { lineId } = context.draft!;
  return rest(
    { do: 'run', label: text.removedLine(line), ops: [{ op: 'remove', entityId: lineId }] },
    { do: 'draft', draft: null },
  );
}
