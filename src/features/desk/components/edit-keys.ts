import type { SheetPoint } from '#shared/contract/document.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import type { EditEvent, LineOp } from '../model/pending-edit.ts';
import type { ViewStore } from '../model/view-store.ts';
import { stepAsSeen } from '../model/viewport.ts';

/** Keys of what can be done with the chosen line. */
export const EDIT_KEYS: Readonly<Record<string, LineOp>> = {
  s: 'split',
  j: 'join',
  t: 'trim',
  x: 'extend',
  i: 'reverse',
  o: 'smooth',
};

const WITH_CTRL: Readonly<
  Record<string, Extract<EditEvent['type'], 'chooseAll' | 'copy' | 'paste' | 'duplicate'>>
> = { a: 'chooseAll', c: 'copy', v: 'paste', d: 'duplicate' };

const NUDGES: Readonly<Record<string, SheetPoint>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};
/** A step of an arrow key with Shift, pixels of the sheet. */
const FAR_PX = 10;

type Target = { readonly store: DeskStore };
type SheetTarget = Target & { readonly views: ViewStore };

/** Keys about what is chosen while the sheet has the focus. True when the key was used. */
export function sheetEditKey(event: KeyboardEvent, { store, views }: SheetTarget): boolean {
  if (event.altKey) return false;
  if (event.ctrlKey || event.metaKey) {
    const type = event.shiftKey ? undefined : WITH_CTRL[event.key.toLowerCase()];
    if (type === undefined || (store.getState().readOnly && type !== 'chooseAll')) return false;
    store.requestEdit({ type });
    return true;
  }
  const step = NUDGES[event.key];
  if (step === undefined || !isMovedByArrows(store.getState())) return false;
  const times = event.shiftKey ? FAR_PX : 1;
  store.requestEdit({
    type: 'nudge',
    by: stepAsSeen(views.getState().view, step[0] * times, step[1] * times),
  });
  return true;
}

/** Arrow keys move what is chosen; with nothing chosen, or something under way, they move the sheet. */
function isMovedByArrows({ tool, selection, draft, pendingEdit, readOnly }: DeskState): boolean {
  if (tool !== 'select' || draft !== null || pendingEdit !== null || readOnly) return false;
  return selection.kind !== 'none' && selection.kind !== 'soil';
}

/** An arrow key let go makes the move a step. */
export function sheetEditKeyUp(event: KeyboardEvent, { store }: Target): void {
  if (NUDGES[event.key] !== undefined) store.requestEdit({ type: 'settle' });
}

/** Keys of the operations, anywhere on the desk but in a field; Escape leaves what is asked for. */
export function deskEditKey(event: KeyboardEvent, { store }: Target): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey || event.shiftKey) return false;
  if (event.key === 'Escape' && store.getState().pendingEdit !== null) {
    store.requestEdit({ type: 'leaveEdit' });
    return true;
  }
  const op = EDIT_KEYS[event.key.toLowerCase()];
  if (op === undefined || store.getState().readOnly) return false;
  store.requestEdit({ type: 'lineOp', op });
  return true;
}
