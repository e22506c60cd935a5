import { lineText } from '#client/text/desk-forms.ts';
import { editLabels, editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { reversed } from '#shared/compute/geometry/edit-lines/join.ts';
import { smoothed } from '#shared/compute/geometry/edit-lines/smooth.ts';
import { type LineKind, singleOf } from '#shared/contract/document.ts';
import type { EditEvent, LineOp } from '../model/pending-edit.ts';
import type { Sketch } from '../model/tool-overlay.ts';
import { everything, toggleAt } from './choose-several.ts';
import { copyChosen, duplicate, paste } from './edit-copy.ts';
import { joinLines } from './edit-join.ts';
import {
  type EditResult,
  editAt,
  isRefusal,
  type LineThing,
  splitAtVertex,
  withPoints,
} from './edit-line.ts';
import { moveBy, nudge, settleNudge } from './edit-move.ts';
import { chosenThings, isLineThing, putAll, refusalToChange, refused } from './edit-things.ts';
import {
  AT_REST,
  type Modifiers,
  rest,
  type ToolContext,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';

/** The tracing accuracy that smoothing holds to where none is stated, pixels. */
const UNSAID_ACCURACY_PX = 1;

/** One step asked for by a key, a bar or a form about what is chosen, whatever tool is in hand. */
export function editStep(state: ToolState, event: EditEvent, context: ToolContext): ToolStep {
  switch (event.type) {
    case 'nudge':
      return nudge(state, event.by, context);
    case 'settle':
      return settleNudge(state, context);
    case 'leaveEdit':
      return { state, commands: [{ do: 'ask', edit: null }] };
    case 'lineOp':
      return lineOp(event.op, context);
    case 'moveBy':
      return event.asCopy ? duplicate(context, event.by) : moveBy(event.by, context);
    case 'changeKind':
      return changeKind(event.line, context);
    case 'chooseAll':
      return withSelectTool(context, rest({ do: 'select', selection: everything(context) }));
    case 'chooseMore':
      return context.pendingEdit?.op === 'chooseMore'
        ? rest({ do: 'ask', edit: null })
        : withSelectTool(context, rest({ do: 'ask', edit: { op: 'chooseMore' } }));
    case 'copy':
      return copyChosen(context);
    case 'paste':
      return withSelectTool(context, paste(context));
    case 'duplicate':
      return withSelectTool(context, duplicate(context));
    case 'removeChosen':
      return removeChosen(context);
  }
}

/** What is asked for is answered on the sheet with the tool that chooses; other tools would draw there. */
function withSelectTool(context: ToolContext, step: ToolStep): ToolStep {
  if (context.tool === 'select' || context.draft !== null) return step;
  return { ...step, commands: [{ do: 'tool', tool: 'select', boundary: null }, ...step.commands] };
}

/** Removes all that is chosen, as one step. */
export function removeChosen(context: ToolContext): ToolStep {
  const refusal = refusalToChange(context);
  if (refusal !== null) return refused(refusal);
  const things = chosenThings(context);
  const ops = things.map(({ id }) => ({ op: 'remove' as const, entityId: id }));
  return rest({ do: 'run', label: editLabels.removed(things.map(({ value }) => value)), ops });
}

/** Gives all chosen lines one kind; what only made sense for the old one goes. */
function changeKind(line: LineKind, context: ToolContext): ToolStep {
  const refusal = refusalToChange(context);
  if (refusal !== null) return refused(refusal);
  const changed = chosenThings(context)
    .filter(isLineThing)
    .filter(({ value }) => value.line !== line)
    .map(({ id, value }) => ({ id, value: { ...value, line, water: null, head: null, drops: null } }));
  if (changed.length === 0) return rest();
  return rest({
    do: 'run',
    label: editLabels.kind(changed.length, lineText.kinds[line]),
    ops: putAll(changed),
  });
}

function lineOp(op: LineOp, context: ToolContext): ToolStep {
  if (context.readOnly) return refused(editRefusals.readOnly);
  if (context.draft !== null) return refused(editRefusals.drawing);
  if (context.selection.kind === 'none') return refused(editRefusals.noneChosen);
  const lines = chosenThings(context).filter(isLineThing);
  const [line, other] = lines;
  if (line === undefined) {
    return refused(
      refusalToChange(context) === editRefusals.locked ? editRefusals.locked : editRefusals.noneChosen,
    );
  }
  if (op === 'reverse') return turnRound(lines);
  if (op === 'smooth') return smooth(lines, context);
  if (op === 'join' && other !== undefined && lines.length === 2) {
    return carriedOut(joinLines(line, other, context));
  }
  if (lines.length > 1 || context.selection.kind === 'several') return refused(editRefusals.oneAtATime);
  const { vertex } = context.selection;
  if (op === 'split' && vertex !== null && vertex > 0 && vertex < line.value.points.length - 1) {
    return carriedOut(splitAtVertex(line, vertex, context));
  }
  return withSelectTool(context, rest({ do: 'ask', edit: { op, lineId: line.id } }));
}

function turnRound(lines: readonly LineThing[]): ToolStep {
  const turned = lines.map(({ id, value }) => ({ id, value: { ...value, points: reversed(value.points) } }));
  return rest({ do: 'run', label: editLabels.reverse(lines.map(({ value }) => value)), ops: putAll(turned) });
}

/** Takes the tremor off all chosen lines that have one, within the tracing accuracy. */
function smooth(lines: readonly LineThing[], context: ToolContext): ToolStep {
  const stated = singleOf(context.document, 'netCount')?.value.tracingAccuracyPx ?? 0;
  const tolerance = stated > 0 ? stated : UNSAID_ACCURACY_PX;
  const calmed = lines.flatMap(({ id, value }): LineThing[] => {
    const { points, farthest } = smoothed(value.points, tolerance);
    return farthest < 0.01 ? [] : [{ id, value: withPoints(value, points) }];
  });
  if (calmed.length === 0) return refused(editRefusals.nothingToSmooth);
  return rest({ do: 'run', label: editLabels.smooth(calmed.map(({ value }) => value)), ops: putAll(calmed) });
}

/** Answers what was asked for with a click; a refusal asks on. */
export function answerEdit(at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const pending = context.pendingEdit ?? null;
  if (pending === null) return rest();
  if (pending.op === 'chooseMore') return toggleAt(context, at);
  const line = pendingLine(context);
  if (line === null) return rest({ do: 'ask', edit: null }, { do: 'notice', text: editRefusals.locked });
  return carriedOut(editAt(pending.op, line, at, keys, context));
}

/** What the edit asked for would do at a place, as it is shown before the click. */
export function sketchesAt(at: SheetPx, keys: Modifiers, context: ToolContext): readonly Sketch[] {
  const pending = context.pendingEdit ?? null;
  const line = pendingLine(context);
  if (pending === null || pending.op === 'chooseMore' || line === null) return [];
  const result = editAt(pending.op, line, at, keys, context);
  return isRefusal(result) ? [] : result.sketches;
}

function pendingLine(context: ToolContext): LineThing | null {
  const pending = context.pendingEdit ?? null;
  if (pending === null || pending.op === 'chooseMore') return null;
  return (
    chosenThings(context)
      .filter(isLineThing)
      .find(({ id }) => id === pending.lineId) ?? null
  );
}

function carriedOut(result: EditResult): ToolStep {
  if (isRefusal(result)) return refused(result.refusal);
  const { label, ops, selection, notice } = result;
  return {
    state: AT_REST,
    commands: [
      { do: 'ask', edit: null },
      { do: 'run', label, ops },
      { do: 'select', selection },
      ...(notice === null ? [] : [{ do: 'notice' as const, text: notice }]),
    ],
  };
}
