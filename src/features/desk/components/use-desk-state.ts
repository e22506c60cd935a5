import { useStore } from 'zustand';
import { useShallow } from 'zustand/react/shallow';
import type { DeskState, DeskStore } from '../model/desk-state.ts';

/**
 * Several parts of a desk's state: what shows them is drawn again when one of them has changed. The whole state must not
 * be asked for, since it changes with every movement of the pointer.
 */
export function useDeskState<Key extends keyof DeskState>(
  store: DeskStore,
  ...keys: readonly Key[]
): Pick<DeskState, Key> {
  return useStore(
    store,
    useShallow((state) => Object.fromEntries(keys.map((key) => [key, state[key]])) as Pick<DeskState, Key>),
  );
}
