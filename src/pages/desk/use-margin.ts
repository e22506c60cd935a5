import { useEffect, useState } from 'react';
import type { MarginForm } from '#client/features/desk/components/margin-form.tsx';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { NoteAnchor } from '#shared/contract/notes.ts';
import type { DeskPane } from './desk-grid.tsx';

export type Margin = { shows: 'notes' } | { shows: 'revisions' } | { shows: 'form'; form: MarginForm };
export const NOTES: Margin = { shows: 'notes' };

/** What the margin shows, and on a narrow screen which pane is to the front; both follow what the sheet asks for. */
export function useMargin(
  store: DeskStore,
  narrow: boolean,
  notes: { setWritingAt: (anchor: NoteAnchor) => void; setChosenId: (id: string) => void },
) {
  const [margin, setMargin] = useState<Margin>(NOTES);
  const [pane, setPane] = useState<DeskPane>('sheet');
  const { setWritingAt, setChosenId } = notes;

  const show = (next: Margin) => {
    setMargin(next);
    setPane('notes');
  };

  useEffect(
    () =>
      store.onIntent((intent) => {
        const form = (opened: MarginForm) => {
          setMargin({ shows: 'form', form: opened });
          setPane('notes');
        };
        switch (intent.type) {
          case 'writeNote':
            setWritingAt(intent.anchor);
            setMargin(NOTES);
            return setPane('notes');
          case 'openNote':
            setChosenId(intent.noteId);
            setMargin(NOTES);
            return setPane('notes');
          case 'openReadingPoint':
            // While points are being placed the sheet stays to the front.
            return store.getState().tool === 'readingPoint' ? undefined : setPane('schedule');
          case 'openKnownPoint':
            // A point just placed is typed next; one only chosen leaves the keys with the sheet.
            return form(
              store.getState().tool === 'knownPoint'
                ? { form: 'setOut', placedId: intent.id }
                : { form: 'setOut' },
            );
          case 'openLine':
            return form({ form: 'line', lineId: intent.id });
          case 'openWaterLevels':
            return form({ form: 'water' });
        }
      }),
    [store, setWritingAt, setChosenId],
  );

  // Placing known points goes with typing what they mean; on a narrow screen the form would hide the sheet.
  useEffect(() => {
    if (narrow) return;
    return store.subscribe((state, before) => {
      if (state.tool === 'knownPoint' && before.tool !== 'knownPoint') {
        setMargin({ shows: 'form', form: { form: 'setOut' } });
      }
    });
  }, [store, narrow]);

  // A line that goes takes its form with it.
  const lineId = margin.shows === 'form' && margin.form.form === 'line' ? margin.form.lineId : null;
  useEffect(() => {
    if (lineId === null) return;
    return store.subscribe((state) => {
      if (!state.document.entities[lineId]) setMargin(NOTES);
    });
  }, [store, lineId]);

  return { margin, pane, setPane, show, close: () => setMargin(NOTES) };
}
