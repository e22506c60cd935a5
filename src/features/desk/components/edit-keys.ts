import type { KeyId } from '#client/text/keys.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';
import type { EditEvent, LineOp } from '../model/pending-edit.ts';
import type { ViewStore } from '../model/view-store.ts';
import { stepAsSeen } from '../model/viewport.ts';
import { ARROW_STEPS, arrowsWith, type KeyBinding, runKey } from './key-binding.ts';

/** Keys of what can be done with the chosen line. */
export const EDIT_KEYS: Readonly<Record<string, LineOp & KeyId>> = {
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

/** A step of an arrow key with Shift, pixels of the sheet. */
const FAR_PX = 10;

type Target = { readonly store: DeskStore };
type SheetTarget = Target & { readonly views: ViewStore };

/** About what is chosen while the sheet has the focus. */
export const SHEET_EDIT_BINDINGS: readonly KeyBinding<SheetTarget>[] = [
  nudgeBinding('nudge', 1),
  nudgeBinding('nudgeFar', FAR_PX),
  ...Object.entries(WITH_CTRL).map(
    ([key, type]): KeyBinding<SheetTarget> => ({
      id: type,
      group: 'chosen',
      presses: [{ key, ctrl: true }],
      run({ store }) {
        if (store.getState().readOnly && type !== 'chooseAll') return false;
        store.requestEdit({ type });
        return true;
      },
    }),
  ),
];

function nudgeBinding(id: 'nudge' | 'nudgeFar', times: number): KeyBinding<SheetTarget> {
  return {
    id,
    group: 'chosen',
    presses: arrowsWith(id === 'nudgeFar' ? { shift: true } : {}),
    run({ store, views }, { key }) {
      const step = ARROW_STEPS[key];
      if (step === undefined || !isMovedByArrows(store.getState())) return false;
      const by = stepAsSeen(views.getState().view, step[0] * times, step[1] * times);
      store.requestEdit({ type: 'nudge', by });
      return true;
    },
  };
}

/** Arrow keys move what is chosen; with nothing chosen, or something under way, they move the sheet. */
function isMovedByArrows({ tool, selection, draft, pendingEdit, readOnly }: DeskState): boolean {
  if (tool !== 'select' || draft !== null || pendingEdit !== null || readOnly) return false;
  return selection.kind !== 'none' && selection.kind !== 'soil';
}

/** The operations, anywhere on the desk but in a field; Escape leaves what is asked for. */
export const DESK_EDIT_BINDINGS: readonly KeyBinding<Target>[] = [
  {
    id: 'leaveEdit',
    group: 'chosen',
    presses: [{ key: 'Escape' }],
    run({ store }) {
      if (store.getState().pendingEdit === null) return false;
      store.requestEdit({ type: 'leaveEdit' });
      return true;
    },
  },
  ...Object.entries(EDIT_KEYS).map(
    ([key, op]): KeyBinding<Target> => ({
      id: op,
      group: 'chosen',
      presses: [{ key }],
      run({ store }) {
        if (store.getState().readOnly) return false;
        store.requestEdit({ type: 'lineOp', op });
        return true;
      },
    }),
  ),
];

/** Keys about what is chosen while the sheet has the focus. True when the key was used. */
export function sheetEditKey(event: KeyboardEvent, target: SheetTarget): boolean {
  return runKey(SHEET_EDIT_BINDINGS, event, target);
}

/** An arrow key let go makes the move a step. */
export function sheetEditKeyUp(event: KeyboardEvent, { store }: Target): void {
  if (ARROW_STEPS[event.key] !== undefined) store.requestEdit({ type: 'settle' });
}

export function deskEditKey(event: KeyboardEvent, target: Target): boolean {
  return runKey(DESK_EDIT_BINDINGS, event, target);
}
