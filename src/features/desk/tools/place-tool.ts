import { deskToolText as text } from '#client/text/desk-tools.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { type EntityOf, entitiesOf, UNSAID } from '#shared/contract/document.ts';
import type { NoteAnchor } from '#shared/contract/notes.ts';
import { cellAt } from '../model/cell-places.ts';
import { nextKnownPointUse } from '../model/known-point-use.ts';
import { selectOne } from '../model/selection.ts';
import { dragTo, grabMark, letGo } from './drag.ts';
import { drawnCrossingAt } from './drawn-crossing.ts';
import { keptPoint } from './line-points.ts';
import { markAt, pickAt } from './pick.ts';
import { rest, stay, type ToolContext, type ToolEvent, type ToolState, type ToolStep } from './tool-types.ts';

/** Places known points: a click sets one, a press on one moves it. */
export function knownPointStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  return markStep(state, event, context, 'knownPoint', (at) => {
    const points = entitiesOf(context.document, 'knownPoint');
    const value: EntityOf<'knownPoint'> = {
      kind: 'knownPoint',
      name: freeName('K', points),
      at: keptPoint(at),
      offset: null,
      elevation: null,
      use: nextKnownPointUse(context.document),
    };
    return value;
  });
}

/** Places reading points: a click sets one, a press on one moves it. */
export function readingPointStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  return markStep(state, event, context, 'readingPoint', (at) => {
    const points = entitiesOf(context.document, 'readingPoint');
    const value: EntityOf<'readingPoint'> = {
      kind: 'readingPoint',
      ...UNSAID.readingPoint,
      name: freeName('P', points),
      place: { on: 'sheet', at: keptPoint(at) },
      order: 1 + points.reduce((last, point) => Math.max(last, point.value.order), 0),
    };
    return value;
  });
}

type MarkKind = 'knownPoint' | 'readingPoint';

function markStep(
  state: ToolState,
  event: ToolEvent,
  context: ToolContext,
  kind: MarkKind,
  make: (at: SheetPx) => EntityOf<MarkKind>,
): ToolStep {
  if (context.readOnly) return stay(state);
  switch (event.type) {
    case 'press':
      return grabMark(context, event.at, [kind]) ?? stay(state);
    case 'move':
      return state.at === 'dragging' ? dragTo(state, event.at, event.keys, context) : stay(state);
    case 'release':
      return state.at === 'dragging' ? letGo(state, event.at, event.keys, context) : stay(state);
    case 'click':
      if (event.count > 1) return openChosen(context, kind);
      // A press on a point has taken hold of it; letting go without moving must not set a second one on it.
      return markAt(context, event.at, [kind]) === null
        ? placed(make(placeMeant(event, kind, context)), context)
        : rest();
    case 'abandonDrag':
      return rest({ do: 'preview', values: {} });
    case 'takeBack':
    case 'remove':
      return removeChosen(context, kind);
    case 'finish':
      return openChosen(context, kind);
    case 'cancel':
      return rest({ do: 'preview', values: {} }, { do: 'tool', tool: 'select', boundary: null });
  }
}

/** A known point goes to the crossing of two drawn lines near the pointer. */
function placeMeant(
  { at, keys }: Extract<ToolEvent, { type: 'click' }>,
  kind: MarkKind,
  context: ToolContext,
): SheetPx {
  return (kind === 'knownPoint' ? drawnCrossingAt(at, keys, context) : null) ?? at;
}

function placed(value: EntityOf<MarkKind>, context: ToolContext): ToolStep {
  const entityId = context.newId();
  const type = value.kind === 'knownPoint' ? 'openKnownPoint' : 'openReadingPoint';
  return rest(
    { do: 'run', label: text.placedMark(value.name), ops: [{ op: 'put', entityId, value }] },
    { do: 'select', selection: selectOne(value.kind, entityId) },
    { do: 'intent', intent: { type, id: entityId } },
  );
}

function openChosen(context: ToolContext, kind: MarkKind): ToolStep {
  const id = context.selection.kind === kind ? context.selection.ids[0] : undefined;
  if (id === undefined) return rest();
  const type = kind === 'knownPoint' ? 'openKnownPoint' : 'openReadingPoint';
  return rest({ do: 'intent', intent: { type, id } });
}

function removeChosen(context: ToolContext, kind: MarkKind): ToolStep {
  const id = context.selection.kind === kind ? context.selection.ids[0] : undefined;
  const value = id === undefined ? undefined : context.document.entities[id]?.value;
  if (id === undefined || value === undefined || !('name' in value)) return rest();
  return rest({ do: 'run', label: text.removedMark(value.name), ops: [{ op: 'remove', entityId: id }] });
}

/** The letter with the lowest number not yet used: K1, K2 …, P1, P2 … */
function freeName(letter: string, points: ReadonlyArray<{ value: { name: string } }>): string {
  const used = new Set(points.map((point) => point.value.name));
  let n = 1;
  while (used.has(`${letter}${n}`)) n += 1;
  return `${letter}${n}`;
}

/** Begins a note at a reading point, a line, a profile, a cell or a bare place; writing it is the notes' affair. */
export function noteStep(state: ToolState, event: ToolEvent, context: ToolContext): ToolStep {
  if (event.type === 'cancel') return rest({ do: 'tool', tool: 'select', boundary: null });
  if (event.type !== 'click' || event.count > 1) return stay(state);
  const picked = pickAt(context, event.at);
  if (picked?.kind === 'note') return rest({ do: 'intent', intent: { type: 'openNote', noteId: picked.id } });
  return rest({ do: 'intent', intent: { type: 'writeNote', anchor: anchorAt(event.at, picked, context) } });
}

function anchorAt(at: SheetPx, picked: ReturnType<typeof pickAt>, { document }: ToolContext): NoteAnchor {
  if (picked?.kind === 'readingPoint')
    return { on: 'readingPoint', entityId: picked.id, at: keptPoint(picked.at) };
  if (picked?.kind === 'line' || picked?.kind === 'profile')
    return { on: picked.kind, entityId: picked.id, at: keptPoint(sheetPx(picked.at[0], picked.at[1])) };
  const place = keptPoint(at);
  return cellAt(document, place) ?? { on: 'place', at: place };
}
