import { type FormEvent, type ReactNode, useState } from 'react';
import { v7 as uuidv7 } from 'uuid';
import { Button } from '#client/components/button.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { commonText } from '#client/text/common.ts';
import { notesText as text } from '#client/text/notes.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { WrittenText } from '../api/note-mutations.ts';
import { useNoteFiles } from '../hooks/use-note-files.ts';
import { FilesToAttach } from './files-to-attach.tsx';
import { NamingTextArea } from './naming-text-area.tsx';

interface NoteWriterProps {
  netId: string;
  people: readonly PersonRef[];
  label: string;
  sendLabel: string;
  error: unknown;
  busy: boolean;
  onSend: (input: WrittenText) => void;
  onCancel: () => void;
  /** Stands between the text and its buttons. */
  children?: ReactNode;
}

/** Where a note or an answer is typed. What is typed stays until the server has it. */
export function NoteWriter({ netId, people, error, busy, onSend, onCancel, ...words }: NoteWriterProps) {
  const [typed, setTyped] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const [id] = useState(() => uuidv7());
  const attached = useNoteFiles(netId);
  const send = () => {
    if (busy) return;
    if (typed.trim() === '') setFault(text.needed);
    else if (attached.files.some((each) => each.state !== 'sent')) setFault(text.filesUnderWay);
    else onSend({ id, text: typed, fileIds: attached.files.map((each) => each.id) });
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    send();
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-2">
      <ProblemNote error={error} />
      <NamingTextArea
        label={words.label}
        hint={text.nameHint}
        error={fault}
        value={typed}
        people={people}
        onChange={(value) => {
          setTyped(value);
          setFault(null);
        }}
        onSend={send}
        onEscape={() => {
          if (typed.trim() === '' && attached.files.length === 0) onCancel();
        }}
      />
      {words.children}
      <FilesToAttach attached={attached} />
      <div className="flex gap-2">
        <Button type="submit" busy={busy} busyLabel={commonText.sending}>
          {words.sendLabel}
        </Button>
        <Button look="text" onClick={onCancel}>
          {commonText.cancel}
        </Button>
      </div>
    </form>
  );
}
