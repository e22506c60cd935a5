import { lineText } from '#client/text/desk-forms.ts';
import { editLabels, editRefusals } from '#client/text/editing-lines.ts';
import { reversed } from '#shared/compute/geometry/edit-lines/join.ts';
import { smoothed } from '#shared/compute/geometry/edit-lines/smooth.ts';
import { type LineKind, singleOf } from '#shared/contract/document.ts';
import { type LineThing, withPoints } from './edit-result.ts';
import { chosenThings, isLineThing, putAll, refusalToChange, refused } from './edit-things.ts';
import { rest, type ToolContext, type ToolStep } from './tool-types.ts';

/** The tracing accuracy that smoothing holds to where none is stated, pixels. */
const UNSAID_ACCURACY_PX = 1;

/** Removes all that is chosen, as one step. */
export function removeChosen(context: ToolContext): ToolStep {
  const refusal = refusalToChange(context);
  if (refusal !== null) return refused(refusal);
  const things = chosenThings(context);
  const ops = things.map(({ id }) => ({ op: 'remove' as const, entityId: id }));
  return rest({ do: 'run', label: editLabels.removed(things.map(({ value }) => value)), ops });
}

/** Gives all chosen lines one kind; what only made sense for the old one goes. */
export function changeKind(line: LineKind, context: ToolContext): ToolStep {
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

/** Turns lines round. */
export function turnRound(lines: readonly LineThing[]): ToolStep {
  const turned = lines.map(({ id, value }) => ({ id, value: { ...value, points: reversed(value.points) } }));
  return rest({ do: 'run', label: editLabels.reverse(lines.map(({ value }) => value)), ops: putAll(turned) });
}

/** Takes the tremor off all chosen lines that have one, within the tracing accuracy. */
export function smooth(lines: readonly LineThing[], context: ToolContext): ToolStep {
  const stated = singleOf(context.document, 'netCount')?.value.tracingAccuracyPx ?? 0;
  const tolerance = stated > 0 ? stated : UNSAID_ACCURACY_PX;
  const calmed = lines.flatMap(({ id, value }): LineThing[] => {
    const { points, farthest } = smoothed(value.points, tolerance);
    return farthest < 0.01 ? [] : [{ id, value: withPoints(value, points) }];
  });
  if (calmed.length === 0) return refused(editRefusals.nothingToSmooth);
  return rest({ do: 'run', label: editLabels.smooth(calmed.map(({ value }) => value)), ops: putAll(calmed) });
}
