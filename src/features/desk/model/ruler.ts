import { createStore, type StoreApi } from 'zustand/vanilla';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { DeskStore } from './desk-state.ts';

/** What is being measured on the sheet. It is no part of the document. */
export type Ruler = {
  /** Ends of the legs, base-raster pixels. */
  readonly places: readonly SheetPoint[];
  /** True once the last leg leads back to the first place. */
  readonly closed: boolean;
  /** True once no further leg follows the pointer. */
  readonly done: boolean;
};

export const NO_RULER: Ruler = { places: [], closed: false, done: false };

const ofStores = new WeakMap<DeskStore, StoreApi<Ruler>>();

/** The ruler of one open net, for as long as it is open. */
export function rulerOf(store: DeskStore): StoreApi<Ruler> {
  const known = ofStores.get(store) ?? createStore<Ruler>(() => NO_RULER);
  ofStores.set(store, known);
  return known;
}
