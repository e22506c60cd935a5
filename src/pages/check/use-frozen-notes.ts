import { useEffect } from 'react';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { useDeskNotes } from '../desk/use-desk-notes.ts';

/** The net's notes on the frozen sheet: the reviewer writes there what the engineer reads on the desk. */
export function useFrozenNotes({ payload }: RevisionDto, store: DeskStore) {
  const notes = useDeskNotes(payload.netId, store);
  const { setWritingAt, setChosenId } = notes;
  useEffect(
    () =>
      store.onIntent((intent) => {
        if (intent.type === 'writeNote') setWritingAt(intent.anchor);
        if (intent.type === 'openNote') setChosenId(intent.noteId);
      }),
    [store, setWritingAt, setChosenId],
  );
  return notes;
}
