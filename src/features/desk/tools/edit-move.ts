import { editLabels, editRefusals } from '#client/text/editing-lines.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { constrained } from './constrain.ts';
import {
  chosenThings,
  isOffTheSheet,
  movedThings,
  putAll,
  refusalToChange,
  refused,
  type Thing,
} from './edit-things.ts';
import { withPointMoved } from './line-points.ts';
import { pickAt } from './pick.ts';
import {
  AT_REST,
  type Modifiers,
  rest,
  stay,
  type ToolCommand,
  type ToolContext,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';

/** Less than this on screen is an unsteady hand and no move; a whole line is not to slip by a click. */
const STEADY_PX = 4;
const NO_PREVIEW: ToolCommand = { do: 'preview', values: {} };

/** Takes hold of all that is chosen where one of it is pressed away from a vertex; null when none is there. */
export function grabChosen(context: ToolContext, at: SheetPx): ToolStep | null {
  const { selection } = context;
  if (selection.kind !== 'several' && selection.kind !== 'line' && selection.kind !== 'profile') return null;
  if (refusalToChange(context) !== null) return null;
  const picked = pickAt(context, at);
  if (picked === null || picked.kind === 'note' || !selection.ids.includes(picked.id)) return null;
  if (movedThings(chosenThings(context), [0, 0]).length === 0) return null;
  return { state: { at: 'moving', pressedAt: at, by: [0, 0], moved: false }, commands: [] };
}

type Moving = Extract<ToolState, { at: 'moving' }>;

/** Shows what is chosen where the pointer has taken it; with Shift level, plumb or at 45°. */
export function moveChosen(state: Moving, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const to = keys.shift ? constrained(context, state.pressedAt, at) : at;
  const by: SheetPoint = [to[0] - state.pressedAt[0], to[1] - state.pressedAt[1]];
  const away = Math.hypot(at[0] - state.pressedAt[0], at[1] - state.pressedAt[1]) * context.zoom;
  if (!state.moved && away < (context.steadyPx ?? STEADY_PX)) return stay(state);
  return {
    state: { ...state, by, moved: true },
    commands: [previewOf(movedThings(chosenThings(context), by))],
  };
}

/** Lets go of what was dragged: one step that can be taken back. */
export function dropChosen(state: Moving, at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const moved = moveChosen(state, at, keys, context).state;
  return moved.at === 'moving' && moved.moved ? moveBy(moved.by, context) : rest(NO_PREVIEW);
}

/** Moves all that is chosen by a step in sheet pixels. */
export function moveBy(by: SheetPoint, context: ToolContext): ToolStep {
  const refusal = refusalToChange(context);
  if (refusal !== null) return { state: AT_REST, commands: [NO_PREVIEW, ...refused(refusal).commands] };
  const things = chosenThings(context);
  const moved = movedThings(things, by);
  if (moved.length === 0) return rest(NO_PREVIEW, { do: 'notice', text: editRefusals.typedStays });
  if (moved.some(isOffTheSheet)) return rest(NO_PREVIEW, { do: 'notice', text: editRefusals.offTheSheet });
  const label = editLabels.moved(moved.map(({ value }) => value));
  const stayed = things.length - moved.length;
  const told: ToolCommand[] = stayed > 0 ? [{ do: 'notice', text: editRefusals.typedStay(stayed) }] : [];
  return rest({ do: 'run', label, ops: putAll(moved) }, NO_PREVIEW, ...told);
}

/**
 * Moves what is chosen, or the one chosen vertex, by an arrow key: shown at once, and one step when the key is let go,
 * however often it was repeated.
 */
export function nudge(state: ToolState, by: SheetPoint, context: ToolContext): ToolStep {
  const refusal = refusalToChange(context);
  if (refusal !== null) return refused(refusal);
  const before: SheetPoint = state.at === 'nudging' ? state.by : [0, 0];
  const whole: SheetPoint = [before[0] + by[0], before[1] + by[1]];
  const vertex = vertexMoved(whole, context);
  const moved = vertex === null ? movedThings(chosenThings(context), whole) : [vertex];
  if (moved.length === 0) return refused(editRefusals.typedStays);
  return { state: { at: 'nudging', by: whole }, commands: [previewOf(moved)] };
}

/** Makes the move by arrow keys a step. */
export function settleNudge(state: ToolState, context: ToolContext): ToolStep {
  if (state.at !== 'nudging') return stay(state);
  const vertex = vertexMoved(state.by, context);
  if (vertex === null) return moveBy(state.by, context);
  if (isOffTheSheet(vertex)) return rest(NO_PREVIEW, { do: 'notice', text: editRefusals.offTheSheet });
  return rest({ do: 'run', label: editLabels.movedVertex(vertex.value), ops: putAll([vertex]) }, NO_PREVIEW);
}

/** The one chosen line with its chosen vertex moved; null when no vertex is chosen. */
function vertexMoved(by: SheetPoint, context: ToolContext): Thing<TracedLine> | null {
  const [id] = context.selection.ids;
  const { vertex } = context.selection;
  const value = id === undefined ? undefined : context.document.entities[id]?.value;
  const from = vertex !== null && value?.kind === 'line' ? value.points[vertex] : undefined;
  if (id === undefined || value?.kind !== 'line' || vertex === null || from === undefined) return null;
  return { id, value: withPointMoved(value, vertex, sheetPx(from[0] + by[0], from[1] + by[1])) };
}

function previewOf(things: readonly Thing[]): ToolCommand {
  return { do: 'preview', values: Object.fromEntries(things.map(({ id, value }) => [id, value])) };
}
