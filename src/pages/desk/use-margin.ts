import { useEffect, useRef, useState } from 'react';
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
  /** Unfolds the pane of what is asked for. */
  bring: (pane: DeskPane) => void,
) {
  const [margin, setMargin] = useState<Margin>(NOTES);
  const [pane, setPane] = useState<DeskPane>('sheet');
  const { setWritingAt, setChosenId } = notes;
  const bringNewest = useRef(bring);
  useEffect(() => {
    bringNewest.current = bring;
  });

  const show = (next: Margin) => {
    setMargin(next);
    setPane('notes');
    bring('notes');
  };

  useEffect(
    () =>
      store.onIntent((intent) => {
        const front = () => {
          setPane('notes');
          bringNewest.current('notes');
        };
        const form = (opened: MarginForm) => {
          setMargin({ shows: 'form', form: opened });
          front();
        };
        switch (intent.type) {
          case 'writeNote':
            setWritingAt(intent.anchor);
            setMargin(NOTES);
            return front();
          case 'openNote':
            setChosenId(intent.noteId);
            setMargin(NOTES);
            return front();
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
          case 'openReading':
            return form({ form: 'reading', pointId: intent.id });
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
      else if (chosen(state) === null && chosen(before) !== null) setMargin(withoutChosen);
    });
  }, [store, narrow, writing]);

  // A line or point that goes takes its form with it.
  const shownId = entityShown(margin);
  useEffect(() => {
    if (shownId === null) return;
    return store.subscribe((state) => {
      if (!state.document.entities[shownId]) setMargin(NOTES);
    });
  }, [store, shownId]);

  return { margin, pane, setPane, show, close: () => setMargin(NOTES) };
}

/** The form that a change of tool or of selection asks for; null when it asks for none. */
function formFor(state: DeskState, before: DeskState): MarginForm | null {
  if (state.tool === 'knownPoint' && before.tool !== 'knownPoint') return { form: 'setOut' };
  const id = chosen(state);
  if (id === null || id === chosen(before)) return null;
  if (state.selection.kind === 'several') return { form: 'several' };
  if (state.selection.kind === 'line') return { form: 'line', lineId: id };
  // While points are being placed one after the other nothing opens.
  return state.tool === 'readingPoint' ? null : { form: 'reading', pointId: id, byChoice: true };
}

/** The one line or reading point that is chosen, or that several things are. */
function chosen({ selection }: DeskState): string | null {
  if (selection.kind === 'several') return selection.kind;
  const opens = selection.kind === 'line' || selection.kind === 'readingPoint';
  return opens && selection.ids.length === 1 ? (selection.ids[0] ?? null) : null;
}

/** What is no longer chosen gives its place in the margin back to the notes; other forms stay. */
const withoutChosen = (margin: Margin): Margin =>
  entityShown(margin) === null && !isOfSeveral(margin) ? margin : NOTES;

const isOfSeveral = (margin: Margin) => margin.shows === 'form' && margin.form.form === 'several';

/** The line or point that the margin is about, which it goes with. */
function entityShown(margin: Margin): string | null {
  if (margin.shows !== 'form') return null;
  if (margin.form.form === 'line') return margin.form.lineId;
  return margin.form.form === 'reading' ? margin.form.pointId : null;
}
