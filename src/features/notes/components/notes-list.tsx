import { useEffect, useState } from 'react';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { notesText as text } from '#client/text/notes.ts';
import type { NoteAnchor, NoteDto } from '#shared/contract/notes.ts';
import { useWriteNote } from '../api/note-mutations.ts';
import { NoteItem } from './note-item.tsx';
import { NoteWriter } from './note-writer.tsx';

interface NotesListProps {
  netId: string;
  notes: readonly NoteDto[];
  /** Why the notes could not be loaded; null when they could. */
  error: unknown;
  /** What an anchor is about, such as "at P3"; the page knows the document. */
  targetOf: (anchor: NoteAnchor) => string;
  canWrite: boolean;
  chosenId: string | null;
  onChoose: ((note: NoteDto) => void) | null;
  /** Place of the note about to be written; null when none is. */
  writingAt: NoteAnchor | null;
  onWritten: (note: NoteDto | null) => void;
}

/** The notes of a net in the margin of the sheet, with the one being written at the foot. */
export function NotesList(props: NotesListProps) {
  const { notes, canWrite, chosenId, onChoose, targetOf } = props;
  const [withClosed, setWithClosed] = useState(false);
  const now = useNow();
  const closed = notes.filter((note) => note.state === 'closed');
  const shown = withClosed ? notes : notes.filter((note) => note.state !== 'closed' || note.id === chosenId);
  useChosenInView(chosenId);
  return (
    <section aria-label={text.title} className="min-h-0 flex-1 overflow-y-auto pt-1.5">
      <NotesHead notes={notes} />
      <ProblemNote error={props.error} />
      {notes.length === 0 && !props.error && !props.writingAt ? (
        <p className="m-0 px-3 py-1 text-ink-2">{canWrite ? text.empty : text.emptyReader}</p>
      ) : null}
      <ol className="m-0 list-none p-0">
        {shown.map((note) => (
          <NoteItem
            key={note.id}
            note={note}
            target={targetOf(note.anchor)}
            chosen={note.id === chosenId}
            canWrite={canWrite}
            onChoose={onChoose ? () => onChoose(note) : null}
            now={now}
          />
        ))}
      </ol>
      {props.writingAt ? <NewNote {...props} anchor={props.writingAt} /> : null}
      {closed.length > 0 ? (
        <button
          type="button"
          className="touch px-3 py-1 text-sm text-ink-2 underline"
          onClick={() => setWithClosed(!withClosed)}
        >
          {withClosed ? text.hideClosed : text.showClosed(closed.length)}
        </button>
      ) : null}
    </section>
  );
}

function NotesHead({ notes }: Pick<NotesListProps, 'notes'>) {
  const open = notes.filter((note) => note.state !== 'closed').length;
  return (
    <div className="flex items-baseline gap-3 px-3 py-1.5">
      <h2 className="m-0 text-base font-bold">{text.title}</h2>
      <span className="text-ink-2" aria-live="polite">
        {open === 0 ? text.noneOpen : text.open(open)}
      </span>
    </div>
  );
}

function NewNote({ netId, anchor, targetOf, onWritten }: NotesListProps & { anchor: NoteAnchor }) {
  const write = useWriteNote(netId);
  return (
    <div className="border-t border-rule-2 px-3 py-2">
      <NoteWriter
        label={text.writeAt(targetOf(anchor))}
        sendLabel={text.send}
        error={write.error}
        busy={write.isPending}
        onSend={(input) => write.mutate({ ...input, anchor }, { onSuccess: onWritten })}
        onCancel={() => onWritten(null)}
      />
    </div>
  );
}

const MINUTE = 60_000;

/** The time, once a minute, so that "12 min ago" does not stand still. */
function useNow(): Date {
  const [now, setNow] = useState(() => new Date());
  useEffect(() => {
    const timer = setInterval(() => setNow(new Date()), MINUTE);
    return () => clearInterval(timer);
  }, []);
  return now;
}

function useChosenInView(chosenId: string | null): void {
  useEffect(() => {
    if (chosenId) document.getElementById(`note-${chosenId}`)?.scrollIntoView({ block: 'nearest' });
  }, [chosenId]);
}
