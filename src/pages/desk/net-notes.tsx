import { useQuery } from '@tanstack/react-query';
import { memberListQuery } from '#client/features/dams/api/dam-queries.ts';
import { NotesList } from '#client/features/notes/components/notes-list.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import type { DamAction } from '#shared/contract/actions.ts';
import type { useDeskNotes } from './use-desk-notes.ts';

interface NetNotesProps {
  netId: string;
  damId: string;
  notes: ReturnType<typeof useDeskNotes>;
  can: readonly DamAction[];
  /** Shows the sheet, where it is not beside the notes already. */
  onSheet: () => void;
}

/** The notes of a net beside its sheet, on the desk and on the page of the check. */
export function NetNotes({ netId, damId, notes, can, onSheet }: NetNotesProps) {
  const { person } = useSession();
  const members = useQuery(memberListQuery(damId)).data ?? [];
  return (
    <NotesList
      netId={netId}
      notes={notes.notes}
      error={notes.error}
      targetOf={notes.targetOf}
      reader={{
        ownId: person?.id ?? null,
        canWrite: can.includes('note.write'),
        canDecide: can.includes('revision.decide'),
        people: members.map((member) => member.person),
      }}
      chosenId={notes.chosenId}
      onChoose={(note) => {
        notes.choose(note);
        onSheet();
      }}
      onNextOpen={notes.nextOpen}
      writingAt={notes.writingAt}
      onWriteAt={notes.setWritingAt}
      onWritten={(note) => {
        notes.setWritingAt(null);
        if (note) notes.setChosenId(note.id);
      }}
    />
  );
}
