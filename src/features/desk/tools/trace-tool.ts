import { deskToolText as text } from '#client/text/desk-tools.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { nearestVertex } from '#shared/compute/geometry/hit-test.ts';
import { entitiesOf, type TracedLine } from '#shared/contract/document.ts';
import type { Draft } from '../model/desk-state.ts';
import { NO_SELECTION, selectOne } from '../model/selection.ts';
import type { LineChoice } from '../model/tool-choice.ts';
import { constrained } from './constrain.ts';
import { growingEnd, keptPoint, withPointAdded, withPointTakenBack } from './line-points.ts';
import { reachOf } from './pick.ts';
import { snapAt } from './snap.ts';
import {
  type Modifiers,
  rest,
  stay,
  type ToolContext,
  type ToolEvent,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';

/**
 * Draws lines point by point. The line under way is kept in the document from its first point on, unfinished, so
 * that it outlives a reload; the draft says which line it is and at which end it grows.
 */
export function traceStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  if (context.readOnly || context.choice === null) return stay(state);
  const line = draftLine(context);
  switch (event.type) {
    case 'click':
      if (event.count > 1) return line === null ? stay(state) : finish(line, context);
      return line === null
        ? begin(event.at, event.keys, context)
        : extend(line, event.at, event.keys, context);
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
  const choice = context.choice!;
  const open = keys.ctrl ? null : openEndAt(at, choice, context);
  if (open !== null) {
    return rest({ do: 'select', selection: NO_SELECTION }, { do: 'draft', draft: open });
  }
  const entityId = context.newId();
  const value: TracedLine = {
    kind: 'line',
    origin: 'traced',
    line: choice.line,
    name: '',
    points: [keptPoint(nextPlace(at, keys, context))],
    finished: false,
    water: choice.water,
    head: null,
    drops: null,
  };
  return rest(
    { do: 'select', selection: NO_SELECTION },
    { do: 'run', label: text.began(value), ops: [{ op: 'put', entityId, value }] },
    { do: 'draft', draft: { lineId: entityId, atStart: false } },
  );
}

/** The open end of an unfinished line of the same kind under the pointer, to go on with it. */
function openEndAt(at: SheetPx, choice: LineChoice, context: ToolContext): Draft | null {
  const ends = entitiesOf(context.document, 'line')
    .filter(({ value }) => !value.finished && value.line === choice.line && value.water === choice.water)
    .map(({ id, value }) => ({
      id,
      points: [value.points.at(-1) ?? [0, 0], value.points[0] ?? [0, 0]] as const,
    }));
  const hit = nearestVertex(ends, at, reachOf(context));
  return hit === null ? null : { lineId: hit.id, atStart: hit.index === 1 };
}

function extend(line: TracedLine, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const { lineId, atStart } = context.draft!;
  const place = keptPoint(nextPlace(at, keys, context));
  const end = growingEnd(line, atStart);
  if (end !== null && end[0] === place[0] && end[1] === place[1]) return rest();
  const value = withPointAdded(line, sheetPx(...place), atStart);
  return rest({ do: 'run', label: text.addedPoint(line), ops: [{ op: 'put', entityId: lineId, value }] });
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
  const { lineId, atStart } = context.draft!;
  if (line.points.length <= 1) return abandon(line, context);
  const value = withPointTakenBack(line, atStart);
  return rest({ do: 'run', label: text.tookPointBack(line), ops: [{ op: 'put', entityId: lineId, value }] });
}

function abandon(line: TracedLine, context: ToolContext): ToolStep {
  const { lineId } = context.draft!;
  return rest(
    { do: 'run', label: text.removedLine(line), ops: [{ op: 'remove', entityId: lineId }] },
    { do: 'draft', draft: null },
  );
}
