import { useMemo } from 'react';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { ComparedNet } from './compared-net.ts';

/** A desk that only shows: the document with the reading that is compared. */
export function useShownNet({ document, reading }: ComparedNet) {
  return useMemo(
    () => ({ store: createDeskStore({ document }, { reading, readOnly: true }) }),
    [document, reading],
  );
}
