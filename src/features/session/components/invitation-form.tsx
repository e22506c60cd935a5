import { useSuspenseQuery } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { sessionText as text } from '#client/text/session.ts';
import { useAcceptInvitation } from '../api/session-mutations.ts';
import { invitationQuery } from '../api/session-queries.ts';
import { NewPasswordField } from './new-password-field.tsx';

export function InvitationForm({ token, onAccepted }: { token: string; onAccepted: () => void }) {
  const { data: invitation } = useSuspenseQuery(invitationQuery(token));
  const [name, setName] = useState('');
  const [password, setPassword] = useState('');
  const accept = useAcceptInvitation();
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!accept.isPending) accept.mutate({ token, name, password }, { onSuccess: onAccepted });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0">{text.invitationLead(invitation.invitedBy, invitation.damName)}</p>
      <ProblemNote error={accept.error} />
      {/* Read by password managers, so that they keep the password under the right address. */}
      <TextField label={text.email} type="email" autoComplete="username" readOnly value={invitation.email} />
      <TextField
        label={text.name}
        hint={text.nameHint}
        name="name"
        autoComplete="name"
        required
        maxLength={200}
        error={fieldMessage(accept.error, 'name')}
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      <NewPasswordField path="password" value={password} onChange={setPassword} error={accept.error} />
      <div>
        <Button type="submit" look="main" busy={accept.isPending}>
          {text.accept}
        </Button>
      </div>
    </form>
  );
}
