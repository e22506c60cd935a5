import { editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import type { EditEvent, LineOp } from '../model/pending-edit.ts';
import type { Sketch } from '../model/tool-overlay.ts';
import { everything, toggleAt } from './choose-several.ts';
import { changeKind, removeChosen, smooth, turnRound } from './edit-at-once.ts';
import { copyChosen, duplicate, paste } from './edit-copy.ts';
import { joinLines } from './edit-join.ts';
import { editAt } from './edit-line.ts';
import { moveBy, nudge, settleNudge } from './edit-move.ts';
import { type EditResult, isRefusal, type LineThing } from './edit-result.ts';
import { splitAtVertex } from './edit-split.ts';
import { chosenThings, isLineThing, refusalToChange, refused } from './edit-things.ts';
import {
  AT_REST,
  type Modifiers,
  rest,
  type ToolContext,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';

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
