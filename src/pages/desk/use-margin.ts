import { useEffect, useState } from 'react';
import type { MarginForm } from '#client/features/desk/components/margin-form.tsx';
import type { DeskState, DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { NoteAnchor } from '#shared/contract/notes.ts';
import type { DeskPane } from './desk-grid.tsx';

export type Margin = { shows: 'notes' } | { shows: 'revisions' } | { shows: 'form'; form: MarginForm };
export const NOTES: Margin = { shows: 'notes' };

/** What the margin shows, and on a narrow screen which pane is to the front; both follow what the sheet asks for. */
export function useMargin(
  store: DeskStore,
  narrow: boolean,
  notes: {
    writingAt: NoteAnchor | null;
    setWritingAt: (anchor: NoteAnchor) => void;
    setChosenId: (id: string) => void;
  },
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
          case 'openMeasured':
            return form({ form: 'measured', pointId: intent.id });
          case 'openLine':
            return form({ form: 'line', lineId: intent.id });
          case 'openWaterLevels':
            return form({ form: 'water' });
        }
      }),
    [store, setWritingAt, setChosenId],
  );

  // What goes with the tool or the line in hand stands beside the sheet; on a narrow screen it would hide the sheet.
  const writing = notes.writingAt !== null;
  useEffect(() => {
    if (narrow || writing) return;
    return store.subscribe((state, before) => {
      const form = formFor(state, before);
      if (form) setMargin({ shows: 'form', form });
      else if (chosenLine(state) === null && chosenLine(before) !== null) setMargin(withoutLine);
    });
  }, [store, narrow, writing]);

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

/** The form that a change of tool or of selection asks for; null when it asks for none. */
function formFor(state: DeskState, before: DeskState): MarginForm | null {
  if (state.tool === 'knownPoint' && before.tool !== 'knownPoint') return { form: 'setOut' };
  const lineId = chosenLine(state);
  return lineId !== null && lineId !== chosenLine(before) ? { form: 'line', lineId } : null;
}

function chosenLine({ selection }: DeskState): string | null {
  return selection.kind === 'line' && selection.ids.length === 1 ? (selection.ids[0] ?? null) : null;
}

/** A line no longer chosen gives its place in the margin back to the notes; other forms stay. */
const withoutLine = (margin: Margin): Margin =>
  margin.shows === 'form' && margin.form.form === 'line' ? NOTES : margin;
