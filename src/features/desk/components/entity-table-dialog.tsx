import { lazy, Suspense, useEffect, useState } from 'react';
import { createPortal } from 'react-dom';
import type { DeskStore } from '../model/desk-state.ts';

/** Loaded when it is wanted. */
const EntityTable = lazy(() => import('./entity-table.tsx'));

/** Lines and points as tables, opened by a key or by the list of what is on the sheet. */
export function EntityTableDialog({ store }: { store: DeskStore }) {
  const [open, setOpen] = useState(false);
  useEffect(() => store.onIntent((intent) => intent.type === 'openTable' && setOpen(true)), [store]);
  if (!open) return null;
  return createPortal(
    <Suspense fallback={null}>
      <EntityTable store={store} onClose={() => setOpen(false)} />
    </Suspense>,
    document.body,
  );
}
