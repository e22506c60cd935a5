import { NotesList } from '#client/features/notes/components/notes-list.tsx';
import type { useDeskNotes } from './use-desk-notes.ts';

interface NetNotesProps {
  netId: string;
  notes: ReturnType<typeof useDeskNotes>;
  canWrite: boolean;
  /** Shows the sheet, where it is not beside the notes already. */
  onSheet: () => void;
}

/** The notes of a net beside its sheet, on the desk and on the page of the check. */
export function NetNotes({ netId, notes, canWrite, onSheet }: NetNotesProps) {
  return (
    <NotesList
      netId={netId}
      notes={notes.notes}
      error={notes.error}
      targetOf={notes.targetOf}
      canWrite={canWrite}
      chosenId={notes.chosenId}
      onChoose={(note) => {
        notes.choose(note);
        onSheet();
      }}
      writingAt={notes.writingAt}
      onWritten={(note) => {
        notes.setWritingAt(null);
        if (note) notes.setChosenId(note.id);
      }}
    />
  );
}
