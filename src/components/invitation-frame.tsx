import type { FormEvent, ReactNode } from 'react';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { commonText } from '#client/text/common.ts';
import { Button } from './button.tsx';
import { TextField } from './field.tsx';
import { ProblemNote } from './problem-note.tsx';

interface InvitationFrameProps {
  lead: string;
  emailLabel: string;
  email: string;
  onEmail: (email: string) => void;
  /** What else is asked of the person invited. */
  children: ReactNode;
  action: string;
  error: unknown;
  busy: boolean;
  onSubmit: () => void;
}

/** The form that invites somebody by mail, to the installation or to a dam. Sends nothing while it is busy. */
export function InvitationFrame(props: InvitationFrameProps) {
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!props.busy) props.onSubmit();
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0 text-ink-2">{props.lead}</p>
      <ProblemNote error={props.error} />
      <TextField
        label={props.emailLabel}
        type="email"
        required
        autoComplete="off"
        error={fieldMessage(props.error, 'email')}
        value={props.email}
        onChange={(event) => props.onEmail(event.target.value)}
      />
      {props.children}
      <div>
        <Button type="submit" look="main" busy={props.busy} busyLabel={commonText.sending}>
          {props.action}
        </Button>
      </div>
    </form>
  );
}
