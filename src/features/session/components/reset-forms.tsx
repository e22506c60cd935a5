import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { sessionText as text } from '#client/text/session.ts';
import { useRequestReset, useSetPassword } from '../api/session-mutations.ts';
import { NewPasswordField } from './new-password-field.tsx';

/** Asks for the mail with the link. The answer is the same for a known and an unknown address. */
export function ResetRequestForm() {
  const [email, setEmail] = useState('');
  const request = useRequestReset();
  if (request.isSuccess) return <p role="status">{text.linkSent}</p>;
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!request.isPending) request.mutate({ email });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0">{text.resetLead}</p>
      <ProblemNote error={request.error} />
      <TextField
        label={text.email}
        type="email"
        name="email"
        autoComplete="username"
        required
        value={email}
        onChange={(event) => setEmail(event.target.value)}
      />
      <div>
        <Button type="submit" look="main" busy={request.isPending}>
          {text.sendLink}
        </Button>
      </div>
    </form>
  );
}

export function SetPasswordForm({ token, onSet }: { token: string; onSet: () => void }) {
  const [password, setPassword] = useState('');
  const set = useSetPassword();
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!set.isPending) set.mutate({ token, password }, { onSuccess: onSet });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <ProblemNote error={set.error} />
      <NewPasswordField
        path="password"
        label={text.newPassword}
        value={password}
        onChange={setPassword}
        error={set.error}
      />
      <div>
        <Button type="submit" look="main" busy={set.isPending}>
          {text.setPassword}
        </Button>
      </div>
    </form>
  );
}
