import { useEffect, useState } from 'react';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { notesText as text } from '#client/text/notes.ts';
import type { NoteAnchor, NoteDto } from '#shared/contract/notes.ts';
import { filterNotes, NO_FILTER } from '../model/note-filter.ts';
import { NewNote } from './new-note.tsx';
import { NoteItem, type NotesReader } from './note-item.tsx';
import { ACTION } from './note-looks.ts';
import { NotesFilter } from './notes-filter.tsx';

export interface NotesListProps {
  netId: string;
  notes: readonly NoteDto[];
  /** Why the notes could not be loaded; null when they could. */
  error: unknown;
  /** What an anchor is about, such as "at P3"; the page knows the document. */
  targetOf: (anchor: NoteAnchor) => string;
  reader: NotesReader;
  chosenId: string | null;
  onChoose: ((note: NoteDto) => void) | null;
  onNextOpen: () => void;
  /** What the note about to be written is on; null when none is. */
  writingAt: NoteAnchor | null;
  onWriteAt: (anchor: NoteAnchor) => void;
  onWritten: (note: NoteDto | null) => void;
}

/** The notes of a net in the margin of the sheet, with the one being written at the top. */
export function NotesList(props: NotesListProps) {
  const { notes, reader, chosenId, onChoose, targetOf } = props;
  const [filter, setFilter] = useState(NO_FILTER);
  const [filtering, setFiltering] = useState(false);
  const now = useNow();
  const through = filterNotes(notes, filter, reader.ownId);
  // What was chosen on the sheet is shown whatever the filter says.
  const shown = notes.filter((note) => note.id === chosenId || through.includes(note));
  useChosenInView(chosenId);
  const empty = notes.length === 0 && !props.error && !props.writingAt;
  return (
    <section aria-label={text.title} className="min-h-0 flex-1 overflow-y-auto pt-1.5">
      <NotesHead notes={notes} />
      <div className="flex flex-wrap gap-x-4 px-3">
        {reader.canWrite ? (
          <button type="button" className={ACTION} onClick={() => props.onWriteAt({ on: 'drawing' })}>
            {text.onDrawing}
          </button>
        ) : null}
        {notes.some((note) => note.state === 'open') ? (
          <button type="button" className={ACTION} title={text.nextOpenHint} onClick={props.onNextOpen}>
            {text.nextOpen}
          </button>
        ) : null}
        {notes.length > 0 ? (
          <button
            type="button"
            className={ACTION}
            aria-expanded={filtering}
            onClick={() => {
              setFiltering(!filtering);
              if (filtering) setFilter(NO_FILTER);
            }}
          >
            {filtering ? text.hideFilter : text.showFilter}
          </button>
        ) : null}
      </div>
      {filtering ? <NotesFilter filter={filter} notes={notes} onChange={setFilter} /> : null}
      <ProblemNote error={props.error} />
      {props.writingAt ? <NewNote {...props} anchor={props.writingAt} /> : null}
      {empty ? (
        <p className="m-0 px-3 py-1 text-ink-2">{reader.canWrite ? text.empty : text.emptyReader}</p>
      ) : null}
      {notes.length > 0 && shown.length === 0 ? (
        <p className="m-0 px-3 py-1 text-ink-2">{filtering ? text.noneMatch : text.noneShown}</p>
      ) : null}
      <ol className="m-0 list-none p-0">
        {shown.map((note) => (
          <NoteItem
            key={note.id}
            note={note}
            target={targetOf(note.anchor)}
            chosen={note.id === chosenId}
            reader={reader}
            onChoose={onChoose ? () => onChoose(note) : null}
            now={now}
          />
        ))}
      </ol>
      <ClosedNotes
        notes={notes}
        withClosed={filter.shown === 'all'}
        onWithClosed={(withClosed) => setFilter({ ...filter, shown: withClosed ? 'all' : 'current' })}
      />
    </section>
  );
}

function NotesHead({ notes }: Pick<NotesListProps, 'notes'>) {
  const open = notes.filter((note) => note.state !== 'closed').length;
  const unread = notes.reduce((sum, note) => sum + note.unread, 0);
  return (
    <div className="flex items-baseline gap-3 px-3 py-1.5">
      <h2 className="m-0 text-base font-bold">{text.title}</h2>
      <span className="text-ink-2" aria-live="polite">
        {open === 0 ? text.noneOpen : text.open(open)}
        {unread > 0 ? <span className="font-semibold text-attention">, {text.unread(unread)}</span> : null}
      </span>
    </div>
  );
}

interface ClosedNotesProps extends Pick<NotesListProps, 'notes'> {
  withClosed: boolean;
  onWithClosed: (withClosed: boolean) => void;
}

function ClosedNotes({ notes, withClosed, onWithClosed }: ClosedNotesProps) {
  const closed = notes.filter((note) => note.state === 'closed').length;
  if (closed === 0) return null;
  return (
    <button
      type="button"
      className="touch px-3 py-1 text-sm text-ink-2 underline"
      onClick={() => onWithClosed(!withClosed)}
    >
      {withClosed ? text.hideClosed : text.showClosed(closed)}
    </button>
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
