import { editRefusals } from '#client/text/editing-lines.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import type { DocumentEntity, SheetPoint } from '#shared/contract/document.ts';
import { canBeTogether, type Selection, selectOne, selectSeveral } from '../model/selection.ts';
import { placesOf, refused, type Thing } from './edit-things.ts';
import { isFree, pickAt, placeOf } from './pick.ts';
import { rest, type ToolContext, type ToolState, type ToolStep } from './tool-types.ts';

/** Adds the thing at a place to what is chosen, or leaves it out. */
export function toggleAt(context: ToolContext, at: SheetPx): ToolStep {
  const picked = pickAt(context, at);
  if (picked === null || picked.kind === 'note') return rest();
  const { selection } = context;
  if (picked.kind === 'knownPoint') {
    if (selection.kind === 'none')
      return rest({ do: 'select', selection: selectOne('knownPoint', picked.id) });
    return refused(editRefusals.knownPointAlone);
  }
  const ids = selection.ids.includes(picked.id)
    ? selection.ids.filter((id) => id !== picked.id)
    : [...selection.ids, picked.id];
  return rest({ do: 'select', selection: selectSeveral(ids, context.document) });
}

/** Begins the rectangle about what is to be chosen, on bare sheet; null over something. */
export function beginFrame(context: ToolContext, at: SheetPx): ToolStep | null {
  return pickAt(context, at) === null ? { state: { at: 'framing', from: at, to: at }, commands: [] } : null;
}

type Framing = Extract<ToolState, { at: 'framing' }>;

/** Chooses what lies wholly inside the rectangle, besides what is chosen already. */
export function endFrame(state: Framing, at: SheetPx, context: ToolContext): ToolStep {
  const inside = chosenWithin(context, state.from, at);
  if (inside.length === 0) return rest();
  return rest({
    do: 'select',
    selection: selectSeveral([...context.selection.ids, ...inside], context.document),
  });
}

function chosenWithin(context: ToolContext, a: SheetPx, b: SheetPx): string[] {
  const [left, right] = [Math.min(a[0], b[0]), Math.max(a[0], b[0])];
  const [top, bottom] = [Math.min(a[1], b[1]), Math.max(a[1], b[1])];
  const isInside = ([x, y]: SheetPoint) => x >= left && x <= right && y >= top && y <= bottom;
  return freeThings(context)
    .filter(({ value }) => {
      const places = shownPlacesOf(value, context);
      return places.length > 0 && places.every(isInside);
    })
    .map(({ id }) => id);
}

/** All that is shown, not locked, and can be chosen together. */
export function everything(context: ToolContext): Selection {
  return selectSeveral(
    freeThings(context).map(({ id }) => id),
    context.document,
  );
}

function freeThings(context: ToolContext): Thing[] {
  return Object.values(context.document.entities).filter(
    ({ value }) => canBeTogether(value) && isFree(context, value),
  );
}

/** Places of a thing on the sheet; of a typed point where the set-out section puts it. */
function shownPlacesOf(value: DocumentEntity, context: ToolContext): readonly SheetPoint[] {
  if (value.kind !== 'readingPoint') return placesOf(value);
  const at = placeOf(value, context.map);
  return at === null ? [] : [[at[0], at[1]]];
}
