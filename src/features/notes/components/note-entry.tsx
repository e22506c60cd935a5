import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { formatAgo, formatMoment } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { commonText } from '#client/text/common.ts';
import { notesText as text } from '#client/text/notes.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import { NOTE_EDIT_MINUTES } from '#shared/contract/limits.ts';
import type { NoteDto, NoteEntryDto } from '#shared/contract/notes.ts';
import { findMentions } from '#shared/text/mentions.ts';
import { useChangeEntry } from '../api/note-mutations.ts';
import { earlierTextsQuery } from '../api/note-queries.ts';
import { EntryFiles } from './entry-files.tsx';
import { NamingTextArea } from './naming-text-area.tsx';
import { ACTION_AMONG_WORDS } from './note-looks.ts';

interface NoteEntryProps {
  note: NoteDto;
  entry: NoteEntryDto;
  /** Said after the author and the time of the first text. */
  target: string;
  people: readonly PersonRef[];
  ownId: string | null;
  canWrite: boolean;
  now: Date;
}

const MINUTE_MS = 60_000;

/** What one person said: text with names, files, when, and for a while the way to change it. */
export function NoteEntry({ note, entry, target, people, ownId, canWrite, now }: NoteEntryProps) {
  const [changing, setChanging] = useState(false);
  const [withEarlier, setWithEarlier] = useState(false);
  const isFresh = now.getTime() - Date.parse(entry.at) < NOTE_EDIT_MINUTES * MINUTE_MS;
  const mayChange = canWrite && isFresh && entry.author.id === ownId && note.state !== 'closed';
  if (changing) return <EntryChange {...{ note, entry, people }} onDone={() => setChanging(false)} />;
  return (
    <div>
      <p className="m-0 break-words whitespace-pre-line">
        <WithNames text={entry.text} named={entry.named} ownId={ownId} />{' '}
        <span className="text-ink-2" title={formatMoment(entry.at)}>
          {shortName(entry.author.name)}, {formatAgo(entry.at, now)}
          {target ? `, ${target}` : ''}
        </span>
        {entry.editedAt ? (
          <>
            {', '}
            <button
              type="button"
              className={ACTION_AMONG_WORDS}
              aria-expanded={withEarlier}
              title={withEarlier ? text.hideEarlier : text.showEarlier}
              onClick={() => setWithEarlier(!withEarlier)}
            >
              {text.edited}
            </button>
          </>
        ) : null}
        {mayChange ? (
          <>
            {' '}
            <button
              type="button"
              className={ACTION_AMONG_WORDS}
              title={text.changeHint}
              onClick={() => setChanging(true)}
            >
              {text.change}
            </button>
          </>
        ) : null}
      </p>
      {withEarlier ? <EarlierTexts noteId={note.id} entry={entry} /> : null}
      <EntryFiles netId={note.netId} files={entry.files} />
    </div>
  );
}

/** A text in which those who were named stand out, the reader most. */
function WithNames({ text: said, named, ownId }: { text: string; named: PersonRef[]; ownId: string | null }) {
  const mentions = findMentions(said, named);
  const starts = [0, ...mentions.map((mention) => mention.end)];
  return starts.map((start, index) => {
    const mention = mentions[index];
    return (
      <span key={start}>
        {said.slice(start, mention?.start)}
        {mention ? (
          <span
            className={`font-semibold ${ownId && mention.personIds.includes(ownId) ? 'bg-doubt' : ''}`}
            data-named
          >
            {said.slice(mention.start, mention.end)}
          </span>
        ) : null}
      </span>
    );
  });
}

function EarlierTexts({ noteId, entry }: { noteId: string; entry: NoteEntryDto }) {
  const { data, error } = useQuery(earlierTextsQuery(noteId, entry));
  return (
    <div className="border-l border-rule pl-2 text-ink-2">
      <ProblemNote error={error} />
      {data?.map((earlier) => (
        <p key={earlier.id} className="m-0 break-words whitespace-pre-line">
          <s>{earlier.text}</s> {formatMoment(earlier.replacedAt)}
        </p>
      ))}
    </div>
  );
}

function EntryChange({
  note,
  entry,
  people,
  onDone,
}: Pick<NoteEntryProps, 'note' | 'entry' | 'people'> & { onDone: () => void }) {
  const [typed, setTyped] = useState(entry.text);
  const change = useChangeEntry(note.netId, note.id, entry.id);
  const isEmpty = typed.trim() === '';
  const keep = () => {
    if (!isEmpty && !change.isPending) change.mutate({ text: typed }, { onSuccess: onDone });
  };
  return (
    <form
      className="flex flex-col gap-2"
      onSubmit={(event) => {
        event.preventDefault();
        keep();
      }}
    >
      <ProblemNote error={change.error} />
      <NamingTextArea
        label={text.changedText}
        error={isEmpty ? text.needed : null}
        value={typed}
        people={people}
        onChange={setTyped}
        onSend={keep}
        onEscape={() => {
          if (typed === entry.text) onDone();
        }}
      />
      <div className="flex gap-2">
        <Button type="submit" busy={change.isPending} busyLabel={commonText.sending}>
          {text.keepChange}
        </Button>
        <Button look="text" onClick={onDone}>
          {commonText.cancel}
        </Button>
      </div>
    </form>
  );
}
