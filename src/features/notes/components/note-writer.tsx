import { type FormEvent, useState } from 'react';
import { v7 as uuidv7 } from 'uuid';
import { Button } from '#client/components/button.tsx';
import { TextArea } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { commonText } from '#client/text/common.ts';
import { notesText as text } from '#client/text/notes.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';

interface NoteWriterProps {
  label: string;
  sendLabel: string;
  error: unknown;
  busy: boolean;
  onSend: (input: { id: string; text: string }) => void;
  onCancel: () => void;
}

/** Where a note or an answer is typed. What is typed stays until the server has it. */
export function NoteWriter({ label, sendLabel, error, busy, onSend, onCancel }: NoteWriterProps) {
  const [typed, setTyped] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const [id] = useState(() => uuidv7());
  const send = () => {
    if (busy) return;
    if (typed.trim() === '') setFault(text.needed);
    else onSend({ id, text: typed });
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    send();
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-2">
      <ProblemNote error={error} />
      <TextArea
        label={label}
        autoFocus
        maxLength={MAX_NOTE_LENGTH}
        value={typed}
        error={fault}
        onChange={(event) => {
          setTyped(event.target.value);
          setFault(null);
        }}
        onKeyDown={(event) => {
          if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) send();
          if (event.key === 'Escape' && typed.trim() === '') onCancel();
        }}
      />
      <div className="flex gap-2">
        <Button type="submit" busy={busy} busyLabel={commonText.sending}>
          {sendLabel}
        </Button>
        <Button look="text" onClick={onCancel}>
          {commonText.cancel}
        </Button>
      </div>
    </form>
  );
}
