import { useEffect } from 'react';
import type { DeskStore } from '../model/desk-state.ts';
import { keepView } from '../model/kept-view.ts';

/** Shows the sheet as its person has chosen, in this visit and the next. */
export function useKeptView(store: DeskStore, personId: string): void {
  useEffect(() => keepView(store, personId), [store, personId]);
}
