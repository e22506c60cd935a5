import { profileText as text } from '#client/text/profiles.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { firstSpacing, newProfile, type Profile } from '../model/profile-edits.ts';
import { NO_SELECTION, selectOne } from '../model/selection.ts';
import { constrained } from './constrain.ts';
import { keptPoint } from './line-points.ts';
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

type Drawn = Profile & { readonly place: Extract<Profile['place'], { on: 'sheet' }> };

/**
 * Draws a profile point by point: it snaps to the traced lines, so that a base or a filter boundary can be followed. It
 * is kept in the document from its first point on, unfinished, as a traced line is.
 */
export function profileStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  if (context.readOnly) return stay(state);
  const drawn = draftProfile(context);
  switch (event.type) {
    case 'click':
      if (event.count > 1) return drawn === null ? stay(state) : finish(drawn, context);
      return drawn === null ? begin(event.at, event.keys, context) : extend(drawn, event, context);
    case 'finish':
      return drawn === null ? stay(state) : finish(drawn, context);
    case 'takeBack':
      return drawn === null ? stay(state) : takeBack(drawn, context);
    case 'cancel':
      return drawn === null ? rest({ do: 'tool', tool: 'select', boundary: null }) : abandon(context);
    default:
      return stay(state);
  }
}

/** The profile under way; null when none is. */
export function draftProfile(context: ToolContext): Drawn | null {
  const value = context.draft === null ? undefined : context.document.entities[context.draft.lineId]?.value;
  return value?.kind === 'profile' && value.place.on === 'sheet' ? { ...value, place: value.place } : null;
}

/** Where its next point would go, and the point from which it goes there. */
export function nextProfilePlace(
  at: SheetPx,
  keys: Modifiers,
  context: ToolContext,
): { from: SheetPx | null; to: SheetPx } {
  const last = draftProfile(context)?.place.points.at(-1);
  const from = last === undefined ? null : sheetPx(...last);
  const snap = snapAt(context, at, keys, null);
  if (snap !== null) return { from, to: snap.at };
  return { from, to: keys.shift && from !== null ? constrained(context, from, at) : at };
}

function begin(at: SheetPx, keys: Modifiers, context: ToolContext): ToolStep {
  const entityId = context.newId();
  const points = [keptPoint(nextProfilePlace(at, keys, context).to)];
  const value = newProfile(context.document, { on: 'sheet', points }, false);
  return rest(
    { do: 'select', selection: NO_SELECTION },
    { do: 'run', label: text.labels.began, ops: [{ op: 'put', entityId, value }] },
    { do: 'draft', draft: { lineId: entityId, atStart: false } },
  );
}

function extend(
  drawn: Drawn,
  { at, keys }: Extract<ToolEvent, { type: 'click' }>,
  context: ToolContext,
): ToolStep {
  const point = keptPoint(nextProfilePlace(at, keys, context).to);
  const end = drawn.place.points.at(-1);
  if (end !== undefined && end[0] === point[0] && end[1] === point[1]) return rest();
  const place = { ...drawn.place, points: [...drawn.place.points, point] };
  return changed({ ...drawn, place }, text.labels.added, context);
}

function finish(drawn: Drawn, context: ToolContext): ToolStep {
  const { points } = drawn.place;
  if (points.length < 2) return abandon(context);
  const value = { ...drawn, spacing: firstSpacing(points, context.map), finished: true };
  const { commands } = changed(value, text.labels.finished(value.name), context);
  const selection = selectOne('profile', context.draft!.lineId);
  return rest(...commands, { do: 'draft', draft: null }, { do: 'select', selection });
}

function takeBack(drawn: Drawn, context: ToolContext): ToolStep {
  if (drawn.place.points.length <= 1) return abandon(context);
  const place = { ...drawn.place, points: drawn.place.points.slice(0, -1) };
  return changed({ ...drawn, place }, text.labels.tookBack, context);
}

function abandon(context: ToolContext): ToolStep {
  const { lineId } = context.draft!;
  return rest(
    { do: 'run', label: text.labels.abandoned, ops: [{ op: 'remove', entityId: lineId }] },
    { do: 'draft', draft: null },
  );
}

function changed(value: Profile, label: string, context: ToolContext): ToolStep {
  return rest({ do: 'run', label, ops: [{ op: 'put', entityId: context.draft!.lineId, value }] });
}
