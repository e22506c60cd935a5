import { deskToolText as text } from '#client/text/desk-tools.ts';
import { profileText } from '#client/text/profiles.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { nearestVertex, segmentAt } from '#shared/compute/geometry/hit-test.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import { selectOne } from '../model/selection.ts';
import type { Snap } from '../model/tool-overlay.ts';
import { constrained } from './constrain.ts';
import { drawnCrossingAt } from './drawn-crossing.ts';
import { keptPoint, withPointInserted } from './line-points.ts';
import { isFree, type Mark, markAt, reachOf } from './pick.ts';
import { snapAt } from './snap.ts';
import {
  AT_REST,
  type DragTarget,
  type Modifiers,
  rest,
  stay,
  type ToolCommand,
  type ToolContext,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';
import { draggedPlace, withVertexDragged } from './ways-of-drawing/fall-off.ts';

type Dragging = Extract<ToolState, { at: 'dragging' }>;

/** Less than this on screen is an unsteady hand and no move. */
const STEADY_PX = 3;

/** Takes hold of a mark of the kinds given; null when none is under the pointer or it may not be moved. */
export function grabMark(context: ToolContext, at: SheetPx, kinds: readonly Mark['kind'][]): ToolStep | null {
  const mark = markAt(context, at, kinds);
  if (mark === null) return null;
  const selected = { do: 'select', selection: selectOne(mark.kind, mark.id) } as const;
  if (!isMovable(context, mark.id)) return null;
  return { state: dragOf({ kind: 'mark', id: mark.id }, at, mark.at, null), commands: [selected] };
}

/** A point typed in section coordinates stays where its figures say; all else on the sheet may be moved. */
function isMovable(context: ToolContext, id: string): boolean {
  const value = context.document.entities[id]?.value;
  if (context.readOnly || value === undefined) return false;
  return value.kind === 'knownPoint' || (value.kind === 'readingPoint' && value.place.on === 'sheet');
}

/** Takes hold of a vertex of the one selected line; with Alt puts a new one in where the line is pressed. */
export function grabVertex(context: ToolContext, at: SheetPx, keys: Modifiers): ToolStep | null {
  const { kind, ids } = context.selection;
  const lineId = ids[0];
  if (kind === 'profile') return grabProfileVertex(context, at);
  if (context.readOnly || kind !== 'line' || ids.length !== 1 || lineId === undefined) return null;
  const line = context.document.entities[lineId]?.value;
  if (line?.kind !== 'line' || !isFree(context, line)) return null;
  const hit = nearestVertex([{ id: lineId, points: line.points }], at, reachOf(context));
  if (hit !== null && !keys.alt) {
    const select = { do: 'select', selection: selectOne('line', lineId, hit.index) } as const;
    const target = { kind: 'vertex', lineId, index: hit.index } as const;
    return { state: dragOf(target, at, sheetPx(hit.at[0], hit.at[1]), null), commands: [select] };
  }
  const place = keys.alt ? segmentAt(line.points, at, reachOf(context)) : null;
  if (place === null) return null;
  const foot = sheetPx(place.at[0], place.at[1]);
  const inserted = withPointInserted(line, place.segment, foot);
  const target = { kind: 'vertex', lineId, index: place.segment + 1 } as const;
  return {
    state: dragOf(target, at, foot, inserted),
    commands: [{ do: 'preview', values: { [lineId]: inserted } }],
  };
}

/** Takes hold of a vertex of the selected profile; one of typed places stays where its figures say. */
function grabProfileVertex({ selection, ...context }: ToolContext, at: SheetPx): ToolStep | null {
  const id = selection.ids[0];
  const value = id === undefined ? undefined : context.document.entities[id]?.value;
  if (context.readOnly || id === undefined || value?.kind !== 'profile') return null;
  if (value.place.on !== 'sheet' || !isFree(context, value)) return null;
  const { points } = value.place;
  const hit = nearestVertex([{ id, points }], at, reachOf({ selection, ...context }));
  if (hit === null) return null;
  const target = { kind: 'vertex', lineId: id, index: hit.index } as const;
  return { state: dragOf(target, at, sheetPx(hit.at[0], hit.at[1]), null), commands: [] };
}

function dragOf(
  target: DragTarget,
  pressedAt: SheetPx,
  from: SheetPx,
  withInserted: DocumentEntity | null,
): Dragging {
  return { at: 'dragging', target, pressedAt, from, moved: false, withInserted };
}

/** Follows the pointer, as a preview: the document changes only when it is let go. */
export function dragTo(state: Dragging, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const away = Math.hypot(at[0] - state.pressedAt[0], at[1] - state.pressedAt[1]) * context.zoom;
  if (!state.moved && away < (context.steadyPx ?? STEADY_PX)) return stay(state);
  const value = valueAt(state, at, keys, context);
  if (value === null) return rest({ do: 'preview', values: {} });
  const values = { [idOf(state.target)]: value };
  return { state: { ...state, moved: true }, commands: [{ do: 'preview', values }] };
}

/** Lets go: what has moved becomes one step that can be taken back. */
export function letGo(state: Dragging, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const clear = { do: 'preview', values: {} } as const;
  const value = state.moved ? valueAt(state, at, keys, context) : state.withInserted;
  if (value === null) return rest(clear);
  const entityId = idOf(state.target);
  const run = {
    do: 'run',
    label: labelOf(state, value),
    ops: [{ op: 'put' as const, entityId, value }],
  } as const;
  const { index } = state.target.kind === 'vertex' ? state.target : { index: 0 };
  const select: ToolCommand[] =
    state.target.kind === 'vertex' && value.kind === 'line'
      ? [
          { do: 'select', selection: selectOne('line', entityId, index) },
          { do: 'clicked', lineId: entityId, places: draggedPlace(context, entityId, value, index) },
        ]
      : [];
  return { state: AT_REST, commands: [{ ...run, ops: [...run.ops] }, clear, ...select] };
}

function labelOf(state: Dragging, value: DocumentEntity): string {
  if (state.withInserted !== null) return text.insertedVertex;
  if (value.kind === 'line') return text.movedVertex(value);
  if (value.kind === 'profile') return profileText.labels.moved(value.name);
  return value.kind === 'knownPoint' || value.kind === 'readingPoint' ? text.movedMark(value.name) : '';
}

function idOf(target: DragTarget): string {
  return target.kind === 'vertex' ? target.lineId : target.id;
}

/** The thing dragged with its place under the pointer; null when someone else has removed it meanwhile. */
function valueAt(state: Dragging, at: SheetPx, keys: Modifiers, context: ToolContext): DocumentEntity | null {
  const held = context.document.entities[idOf(state.target)]?.value;
  if (held === undefined) return null;
  const place = placeFor(state, at, keys, context);
  if (held.kind === 'line' && state.target.kind === 'vertex') {
    const line = state.withInserted?.kind === 'line' ? state.withInserted : held;
    return withVertexDragged(context, state.target.lineId, line, state.target.index, place);
  }
  if (held.kind === 'profile' && held.place.on === 'sheet' && state.target.kind === 'vertex') {
    const { index } = state.target;
    const points = held.place.points.map((point, i) => (i === index ? keptPoint(place) : point));
    return { ...held, place: { on: 'sheet', points } };
  }
  if (held.kind === 'knownPoint') return { ...held, at: keptPoint(place) };
  if (held.kind === 'readingPoint') return { ...held, place: { on: 'sheet', at: keptPoint(place) } };
  return null;
}

/** Where the thing dragged is, with the pointer at a place. */
export function heldAt({ from, pressedAt }: Dragging, at: SheetPx): SheetPx {
  return sheetPx(from[0] + at[0] - pressedAt[0], from[1] + at[1] - pressedAt[1]);
}

function placeFor(state: Dragging, at: SheetPx, keys: Modifiers, context: ToolContext): SheetPx {
  const moved = heldAt(state, at);
  if (state.target.kind === 'vertex') {
    const snap = snapWhileDragging(state.target, moved, keys, context);
    if (snap !== null) return snap.at;
  }
  const held = context.document.entities[idOf(state.target)]?.value;
  const crossing = held?.kind === 'knownPoint' ? drawnCrossingAt(moved, keys, context) : null;
  return crossing ?? (keys.shift ? constrained(context, state.from, moved) : moved);
}

/** What a dragged vertex snaps to; the segment that it ends comes from the vertex beside it. */
export function snapWhileDragging(
  { lineId, index }: Extract<DragTarget, { kind: 'vertex' }>,
  at: SheetPx,
  keys: Modifiers,
  context: ToolContext,
): Snap | null {
  const value = context.document.entities[lineId]?.value;
  const points = value?.kind === 'line' ? value.points : [];
  const beside = index === 0 ? points[1] : index === points.length - 1 ? points[index - 1] : undefined;
  return snapAt(context, at, keys, lineId, beside ?? null);
}
