import type { Stride } from '../model/crosshair.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { Modifiers } from '../tools/tool-types.ts';
import type { CrosshairHand } from './crosshair-hand.ts';
import { ARROW_STEPS, arrowsWith, type KeyBinding, type KeyPress } from './key-binding.ts';

type Target = { readonly store: DeskStore; readonly crosshair: CrosshairHand };

/** The crosshair on the sheet; these records come before all others, for which it leaves what it does not use. */
export const CROSSHAIR_BINDINGS: readonly KeyBinding<Target>[] = [
  arrows('stepCrosshair', 'one', {}),
  arrows('strideCrosshair', 'ten', { shift: true }),
  // Both, because some systems keep the one or the other for themselves.
  arrows('fineCrosshair', 'tenth', { ctrl: true }, { alt: true }),
  clicks('click', {}, { key: ' ' }),
  clicks('clickMore', { shift: true }, { key: ' ', shift: true }),
  clicks('clickFree', { ctrl: true }, { key: ' ', ctrl: true }),
  {
    id: 'insertVertex',
    group: 'crosshair',
    presses: [{ key: 'a' }],
    run: ({ crosshair }) => crosshair.insertVertex(),
  },
  {
    id: 'leaveHold',
    group: 'crosshair',
    presses: [{ key: 'Escape' }],
    run({ store, crosshair }) {
      if (crosshair.abandon()) return true;
      if (!crosshair.isShown() || isAtWork(store)) return false;
      crosshair.putAway();
      return true;
    },
  },
];

/** Without a crosshair arrow keys show it where something is to be set or a place is asked for. */
function arrows(
  id: 'stepCrosshair' | 'strideCrosshair' | 'fineCrosshair',
  stride: Stride,
  ...held: ReadonlyArray<Omit<KeyPress, 'key'>>
): KeyBinding<Target> {
  return {
    id,
    group: 'crosshair',
    presses: held.flatMap(arrowsWith),
    run({ store, crosshair }, { key }) {
      const step = ARROW_STEPS[key];
      if (step === undefined || !(crosshair.isShown() || asksForPlace(store))) return false;
      crosshair.step(step[0], step[1], stride);
      return true;
    },
  };
}

function clicks(
  id: 'click' | 'clickMore' | 'clickFree',
  held: Partial<Modifiers>,
  press: KeyPress,
): KeyBinding<Target> {
  return {
    id,
    group: 'crosshair',
    presses: [press],
    run({ crosshair }, { repeat }) {
      if (!crosshair.isShown()) return false;
      // A key that is held down for long takes hold once.
      if (!repeat) crosshair.click(held);
      return true;
    },
  };
}

function asksForPlace(store: DeskStore): boolean {
  const { tool, pendingEdit } = store.getState();
  return tool !== 'select' || pendingEdit !== null;
}

/** True while Escape has something to end before the crosshair goes. */
function isAtWork(store: DeskStore): boolean {
  const { draft, selection } = store.getState();
  return asksForPlace(store) || draft !== null || selection.kind !== 'none';
}
