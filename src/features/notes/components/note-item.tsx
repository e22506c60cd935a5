import { useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { formatAgo, formatMoment } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { notesText as text } from '#client/text/notes.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { useAnswerNote, useCloseNote } from '../api/note-mutations.ts';
import { NoteWriter } from './note-writer.tsx';

interface NoteItemProps {
  note: NoteDto;
  /** What it is about in a word or two, such as "at P3"; empty for a bare place. */
  target: string;
  chosen: boolean;
  canWrite: boolean;
  /** Null where there is no sheet beside the list. */
  onChoose: (() => void) | null;
  now: Date;
}

/** One note: its balloon's number, what was said by whom and when, and what can be done with it. */
export function NoteItem({ note, target, chosen, canWrite, onChoose, now }: NoteItemProps) {
  return (
    <li id={`note-${note.id}`} className={classNames('relative py-2 pr-3 pl-10', chosen && 'bg-chosen')}>
      <Balloon note={note} onChoose={onChoose} />
      {note.entries.map((entry, index) => (
        <p
          key={entry.id}
          className={classNames(
            'm-0 break-words whitespace-pre-line',
            index > 0 && 'mt-1 border-l border-rule pl-2',
          )}
        >
          {entry.text}{' '}
          <span className="text-ink-2" title={formatMoment(entry.at)}>
            {shortName(entry.author.name)}, {formatAgo(entry.at, now)}
            {index === 0 && target ? `, ${target}` : ''}
          </span>
        </p>
      ))}
      <StateLine note={note} now={now} />
      {canWrite ? <NoteActions note={note} /> : null}
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

function StateLine({ note, now }: Pick<NoteItemProps, 'note' | 'now'>) {
  if (note.state === 'open') return null;
  const closed = note.closedBy && note.closedAt;
  return (
    <p className="m-0 text-sm text-good">
      {closed && note.closedBy && note.closedAt
        ? `${text.closed(shortName(note.closedBy.name))}, ${formatAgo(note.closedAt, now)}`
        : text.answered}
    </p>
  );
}

const ACTION = 'touch text-sm text-ink-2 underline decoration-rule underline-offset-2 hover:text-ink';

function NoteActions({ note }: { note: NoteDto }) {
  const [answering, setAnswering] = useState(false);
  const answer = useAnswerNote(note.netId, note.id);
  const close = useCloseNote(note.netId, note.id);
  if (answering) {
    return (
      <div className="mt-1.5">
        <NoteWriter
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
      <ProblemNote error={close.error} />
    </div>
  );
}
