import { createStore, type StoreApi } from 'zustand/vanilla';
import type { SheetPx } from '#shared/compute/frames.ts';

/** The place that is being set with the magnified view, or null. Apart from React's state, for it changes in every frame. */
export type FollowedPlace = StoreApi<{ readonly at: SheetPx | null }>;

export function createFollowedPlace(): FollowedPlace {
  return createStore<{ readonly at: SheetPx | null }>(() => ({ at: null }));
}
