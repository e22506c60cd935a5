import { type FormEvent, type ReactNode, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { commonText } from '#client/text/common.ts';
import { drawingsText as text } from '#client/text/drawings.ts';

interface NameDialogProps {
  title: string;
  lead?: ReactNode;
  initial: string;
  submitLabel: string;
  error: unknown;
  busy: boolean;
  onSubmit: (name: string) => void;
  onClose: () => void;
}

/** Asks for the load case's name: for a new net, a copy, or another name. */
export function NameDialog({
  title,
  lead,
  initial,
  submitLabel,
  error,
  busy,
  onSubmit,
  onClose,
}: NameDialogProps) {
  const [name, setName] = useState(initial);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!busy) onSubmit(name);
  };
  return (
    <Dialog title={title} onClose={onClose}>
      <form onSubmit={submit} className="flex flex-col gap-3">
        {lead ? <p className="m-0 text-ink-2">{lead}</p> : null}
        <ProblemNote error={error} />
        <TextField
          label={text.loadCase}
          hint={text.loadCaseHint}
          required
          maxLength={200}
          autoFocus
          value={name}
          onChange={(event) => setName(event.target.value)}
        />
        <Actions>
          <Button type="submit" look="main" busy={busy} busyLabel={commonText.saving}>
            {submitLabel}
          </Button>
          <Button look="quiet" onClick={onClose}>
            {commonText.cancel}
          </Button>
        </Actions>
      </form>
    </Dialog>
  );
}
