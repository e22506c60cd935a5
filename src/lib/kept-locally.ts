import { createStore, type StoreApi } from 'zustand/vanilla';

/**
 * A choice that this browser keeps for one person, such as the sizes of panes. A browser that keeps nothing holds it
 * until the page is left.
 */
export function keptLocally<T>(name: string, parse: (kept: string | null) => T): StoreApi<T> {
  const store = createStore<T>(() => parse(read(name)));
  store.subscribe((value) => {
    try {
      globalThis.localStorage?.setItem(name, JSON.stringify(value));
    } catch {
      // Storage is full or forbidden.
    }
  });
  return store;
}

function read(name: string): string | null {
  try {
    return globalThis.localStorage?.getItem(name) ?? null;
  } catch {
    return null;
  }
}
