import { useSyncExternalStore } from 'react';
import type { Saving } from '#client/features/desk/saving/saving.ts';

/** When this person last saved in this visit; null before, and on a desk that is only read. */
export function useSavedAt(saving: Saving | null): number | null {
  return useSyncExternalStore(
    (changed) => saving?.state.subscribe(changed) ?? (() => {}),
    () => saving?.state.getState().savedAt ?? null,
  );
}
