import { deskToolText as text } from '#client/text/desk-tools.ts';
import { profileText } from '#client/text/profiles.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { segmentAt } from '#shared/compute/geometry/hit-test.ts';
import type { TracedLine } from '#shared/contract/document.ts';
import type { LocalOp } from '../model/document-ops.ts';
import { NO_SELECTION, selectOne } from '../model/selection.ts';
import { toolForLine } from '../model/tool-choice.ts';
import { beginFrame, endFrame, toggleAt } from './choose-several.ts';
import { dragTo, grabMark, grabVertex, letGo } from './drag.ts';
import { removeChosen } from './edit-at-once.ts';
import { dropChosen, grabChosen, moveChosen } from './edit-move.ts';
import { answerEdit } from './edit-step.ts';
import { chosenThings } from './edit-things.ts';
import { withoutPoint, withPointInserted } from './line-points.ts';
import { type Picked, pickAt, reachOf } from './pick.ts';
import { computedLineAt } from './pick-guide.ts';
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

/** Chooses things, moves vertices and marks, puts vertices in and takes them out, removes what is chosen. */
export function selectStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  switch (event.type) {
    case 'press':
      return pressed(event.at, event.keys, context) ?? stay(state);
    case 'move':
      return moved(state, event.at, event.keys, context);
    case 'release':
      return released(state, event.at, event.keys, context);
    case 'click':
      return clicked(event, context);
    case 'abandonDrag':
      return rest({ do: 'preview', values: {} });
    case 'cancel':
      if (context.pendingEdit != null) return rest({ do: 'ask', edit: null });
      return rest({ do: 'preview', values: {} }, { do: 'select', selection: NO_SELECTION });
    case 'takeBack':
    case 'remove':
      return removeSelected(context);
    case 'finish':
      return goOn(context);
  }
}

/** What a press takes hold of; null when the sheet is to be panned by it, or a click to follow. */
function pressed(at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep | null {
  // What is asked for is answered by the click.
  if (context.pendingEdit != null) return null;
  const vertex = grabVertex(context, at, keys);
  if (vertex !== null) return vertex;
  if (keys.shift) return beginFrame(context, at);
  return grabChosen(context, at) ?? grabMark(context, at, ['readingPoint', 'knownPoint']);
}

function moved(state: ToolState, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  if (state.at === 'dragging') return dragTo(state, at, keys, context);
  if (state.at === 'moving') return moveChosen(state, at, keys, context);
  return state.at === 'framing' ? { state: { ...state, to: at }, commands: [] } : stay(state);
}

function released(state: ToolState, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  if (state.at === 'dragging') return letGo(state, at, keys, context);
  if (state.at === 'moving') return dropChosen(state, at, keys, context);
  return state.at === 'framing' ? endFrame(state, at, context) : stay(state);
}

function clicked(event: Extract<ToolEvent, { type: 'click' }>, context: ToolContext): ToolStep {
  if (context.pendingEdit != null)
    return event.count > 1 ? rest() : answerEdit(event.at, event.keys, context);
  if (event.keys.shift) return event.count > 1 ? rest() : toggleAt(context, event.at);
  const inserted = event.count > 1 ? insertAt(event, context) : null;
  if (inserted !== null) return inserted;
  const picked = pickAt(context, event.at);
  if (picked === null) return pickedNothing(event.at, context);
  if (picked.kind === 'note') return rest({ do: 'intent', intent: { type: 'openNote', noteId: picked.id } });
  if (event.count > 1) return rest(...opened(picked));
  // A click on a vertex of the chosen line has chosen that vertex already when it was pressed.
  if (context.selection.kind === picked.kind && context.selection.ids.includes(picked.id)) return rest();
  return rest({ do: 'select', selection: selectOne(picked.kind, picked.id) });
}

/** Bare sheet lays down what was chosen; a line of the computed net there can be adopted. */
function pickedNothing(at: SheetPx, context: ToolContext): ToolStep {
  const guideId = computedLineAt(context, at);
  const pick: ToolCommand[] =
    guideId === null ? [] : [{ do: 'intent', intent: { type: 'pickComputedLine', guideId } }];
  return rest({ do: 'select', selection: NO_SELECTION }, ...pick);
}

function opened(picked: Exclude<Picked, { kind: 'note' }>): ToolCommand[] {
  const { id } = picked;
  const select: ToolCommand = { do: 'select', selection: selectOne(picked.kind, id) };
  if (picked.kind === 'line') return [select, { do: 'intent', intent: { type: 'openLine', id } }];
  if (picked.kind === 'profile') return [select];
  const type = picked.kind === 'knownPoint' ? 'openKnownPoint' : 'openReadingPoint';
  return [select, { do: 'intent', intent: { type, id } }];
}

/** A double click on a segment of the chosen line puts a vertex in there. */
function insertAt(event: Extract<ToolEvent, { type: 'click' }>, context: ToolContext): ToolStep | null {
  const chosen = chosenLine(context);
  if (chosen === null || context.readOnly || chosenThings(context).length === 0) return null;
  const { id, line } = chosen;
  const reach = reachOf(context);
  if (line.points.some(([x, y]) => Math.hypot(x - event.at[0], y - event.at[1]) <= reach)) return null;
  const place = segmentAt(line.points, event.at, reach);
  if (place === null) return null;
  const value = withPointInserted(line, place.segment, sheetPx(place.at[0], place.at[1]));
  return rest(
    { do: 'run', label: text.insertedVertex, ops: [{ op: 'put', entityId: id, value }] },
    { do: 'select', selection: selectOne('line', id, place.segment + 1) },
  );
}

function chosenLine(context: ToolContext): { id: string; line: TracedLine } | null {
  const { kind, ids } = context.selection;
  const id = ids[0];
  const value = id === undefined ? undefined : context.document.entities[id]?.value;
  return kind === 'line' && ids.length === 1 && id !== undefined && value?.kind === 'line'
    ? { id, line: value }
    : null;
}

/** Removes the chosen vertex, or when none is chosen all that is. A line keeps two points at least. */
function removeSelected(context: ToolContext): ToolStep {
  // A soil is no mark on the sheet: it is removed in its form, with what refers to it.
  if (context.readOnly || context.selection.kind === 'none' || context.selection.kind === 'soil')
    return rest();
  if (context.selection.kind === 'several' || chosenThings(context).length === 0)
    return removeChosen(context);
  const chosen = chosenLine(context);
  const vertex = context.selection.vertex;
  if (chosen !== null && vertex !== null && chosen.line.points.length > 2) {
    const value = withoutPoint(chosen.line, vertex);
    return rest(
      { do: 'run', label: text.removedVertex(chosen.line), ops: [{ op: 'put', entityId: chosen.id, value }] },
      { do: 'select', selection: selectOne('line', chosen.id, null) },
    );
  }
  const ops: LocalOp[] = context.selection.ids.map((entityId) => ({ op: 'remove', entityId }));
  return rest({ do: 'run', label: removalLabel(context), ops });
}

function removalLabel(context: ToolContext): string {
  const value = context.document.entities[context.selection.ids[0] ?? '']?.value;
  if (value?.kind === 'line') return text.removedLine(value);
  if (value?.kind === 'profile') return profileText.labels.removed(value.name);
  return value?.kind === 'knownPoint' || value?.kind === 'readingPoint' ? text.removedMark(value.name) : '';
}

/** Goes on with the chosen line or profile when it is unfinished. */
function goOn(context: ToolContext): ToolStep {
  const profileId = context.selection.kind === 'profile' ? context.selection.ids[0] : undefined;
  if (profileId !== undefined && !context.readOnly) {
    const value = context.document.entities[profileId]?.value;
    if (value?.kind !== 'profile' || value.finished) return rest();
    const draft = { lineId: profileId, atStart: false };
    return rest({ do: 'tool', tool: 'profile', boundary: null }, { do: 'draft', draft });
  }
  const chosen = chosenLine(context);
  if (chosen === null || chosen.line.finished || context.readOnly) return rest();
  const { tool, boundary } = toolForLine(chosen.line);
  return rest({ do: 'tool', tool, boundary }, { do: 'draft', draft: { lineId: chosen.id, atStart: false } });
}
