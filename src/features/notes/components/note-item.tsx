import { type RefObject, useRef, useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { formatAgo, formatMoment } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { notesText as text } from '#client/text/notes.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { useAnswerNote, useCloseNote, useMustAnswer } from '../api/note-mutations.ts';
import { useSeen } from '../hooks/use-seen.ts';
import { NoteEntry } from './note-entry.tsx';
import { ACTION } from './note-looks.ts';
import { NoteWriter } from './note-writer.tsx';

/** Who reads the notes and what they may do with them. */
export interface NotesReader {
  ownId: string | null;
  canWrite: boolean;
  /** A reviewer of the dam. */
  canDecide: boolean;
  /** Those who may be named. */
  people: readonly PersonRef[];
}

interface NoteItemProps {
  note: NoteDto;
  /** What it is about in a word or two, such as "at P3"; empty for a bare place. */
  target: string;
  chosen: boolean;
  reader: NotesReader;
  /** Null where there is no sheet beside the list. */
  onChoose: (() => void) | null;
  now: Date;
}

/** One note: its balloon's number, what was said by whom and when, and what can be done with it. */
export function NoteItem({ note, target, chosen, reader, onChoose, now }: NoteItemProps) {
  const item = useRef<HTMLLIElement>(null);
  useSeen(item, note);
  return (
    <li
      ref={item as RefObject<HTMLLIElement>}
      id={`note-${note.id}`}
      className={classNames('relative py-2 pr-3 pl-10', chosen && 'bg-chosen')}
    >
      <Balloon note={note} onChoose={onChoose} />
      {note.unread > 0 ? <span className="text-sm font-semibold text-attention">{text.isNew}</span> : null}
      {note.entries.map((entry, index) => (
        <div key={entry.id} className={index > 0 ? 'mt-1 border-l border-rule pl-2' : ''}>
          <NoteEntry
            note={note}
            entry={entry}
            target={index === 0 ? target : ''}
            people={reader.people}
            ownId={reader.ownId}
            canWrite={reader.canWrite}
            now={now}
          />
        </div>
      ))}
      <StateLines note={note} now={now} />
      {reader.canWrite ? <NoteActions note={note} reader={reader} /> : null}
    </li>
  );
}

const BALLOON =
  'absolute top-2 left-3 grid size-5 min-h-0 place-items-center rounded-full border-[1.4px] text-xs font-semibold leading-none';

function Balloon({ note, onChoose }: Pick<NoteItemProps, 'note' | 'onChoose'>) {
  const look = classNames(BALLOON, note.state === 'closed' ? 'border-rule text-ink-2' : 'border-ink');
  if (!onChoose) return <span className={look}>{note.number}</span>;
  return (
    <button
      type="button"
      className={classNames(look, 'bg-film hover:bg-hover')}
      title={text.showOnSheet(note.number)}
      aria-label={text.showOnSheet(note.number)}
      onClick={onChoose}
    >
      {note.number}
    </button>
  );
}

/** Where the note stands, by whom and when. */
function StateLines({ note, now }: Pick<NoteItemProps, 'note' | 'now'>) {
  const { mustAnswer, answered, closedBy, closedAt, state } = note;
  const asked = mustAnswer && state === 'open';
  return (
    <>
      {asked ? (
        <p className="m-0 text-sm text-wrong" title={formatMoment(mustAnswer.at)}>
          {text.mustAnswer(shortName(mustAnswer.by.name))}
        </p>
      ) : null}
      {answered ? (
        <p className="m-0 text-sm text-good" title={formatMoment(answered.at)}>
          {`${text.answered(shortName(answered.by.name))}, ${formatAgo(answered.at, now)}`}
        </p>
      ) : null}
      {closedBy && closedAt ? (
        <p className="m-0 text-sm text-good" title={formatMoment(closedAt)}>
          {`${text.closed(shortName(closedBy.name))}, ${formatAgo(closedAt, now)}`}
        </p>
      ) : null}
    </>
  );
}

function NoteActions({ note, reader }: { note: NoteDto; reader: NotesReader }) {
  const [answering, setAnswering] = useState(false);
  const answer = useAnswerNote(note.netId, note.id);
  const close = useCloseNote(note.netId, note.id);
  if (answering) {
    return (
      <div className="mt-1.5">
        <NoteWriter
          netId={note.netId}
          people={reader.people}
          label={text.answerText(note.number)}
          sendLabel={text.sendAnswer}
          error={answer.error}
          busy={answer.isPending}
          onSend={(input) => answer.mutate(input, { onSuccess: () => setAnswering(false) })}
          onCancel={() => setAnswering(false)}
        />
      </div>
    );
  }
  const closed = note.state === 'closed';
  return (
    <div className="mt-0.5 flex flex-wrap gap-x-4">
      {closed ? null : (
        <button type="button" className={ACTION} onClick={() => setAnswering(true)}>
          {text.answer}
        </button>
      )}
      <button
        type="button"
        className={ACTION}
        disabled={close.isPending}
        onClick={() => close.mutate(!closed)}
      >
        {closed ? text.reopen : text.close}
      </button>
      {reader.canDecide && !closed ? <MustAnswerAction note={note} /> : null}
      <ProblemNote error={close.error} />
    </div>
  );
}

function MustAnswerAction({ note }: { note: NoteDto }) {
  const ask = useMustAnswer(note.netId, note.id);
  const asked = note.mustAnswer !== null;
  return (
    <>
      <button
        type="button"
        className={ACTION}
        title={text.askAnswerHint}
        disabled={ask.isPending}
        onClick={() => ask.mutate(!asked)}
      >
        {asked ? text.letGo : text.askAnswer}
      </button>
      <ProblemNote error={ask.error} />
    </>
  );
}
