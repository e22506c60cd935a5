import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { sessionText as text } from '#client/text/session.ts';
import type { SessionDto } from '#shared/contract/people.ts';
import { useSignIn } from '../api/session-mutations.ts';

interface SignInFormProps {
  demoSignIns: SessionDto['demoSignIns'];
  /** Filled in when the same person signs in again. */
  email?: string;
  onSignedIn: (session: SessionDto) => void;
}

export function SignInForm({ demoSignIns, email: known = '', onSignedIn }: SignInFormProps) {
  const [email, setEmail] = useState(known);
  const [password, setPassword] = useState('');
  const signIn = useSignIn();
  const start = (input: { email: string; password: string }) =>
    signIn.mutate(input, { onSuccess: ({ session }) => onSignedIn(session) });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!signIn.isPending) start({ email, password });
  };
  return (
    <>
      <form onSubmit={submit} className="flex flex-col gap-3">
        <ProblemNote error={signIn.error} />
        <TextField
          label={text.email}
          type="email"
          name="email"
          autoComplete="username"
          required
          value={email}
          onChange={(event) => setEmail(event.target.value)}
        />
        <TextField
          label={text.password}
          type="password"
          name="password"
          autoComplete="current-password"
          required
          value={password}
          onChange={(event) => setPassword(event.target.value)}
        />
        <div>
          <Button type="submit" look="main" busy={signIn.isPending} busyLabel={text.signingIn}>
            {text.signIn}
          </Button>
        </div>
      </form>
      <DemoSignIns signIns={demoSignIns} onChoose={start} />
    </>
  );
}

/** In the demo its people are offered as buttons, so that nobody has to look for a password. */
function DemoSignIns({
  signIns,
  onChoose,
}: {
  signIns: SessionDto['demoSignIns'];
  onChoose: (input: { email: string; password: string }) => void;
}) {
  if (signIns.length === 0) return null;
  return (
    <section className="mt-5 border-t border-rule pt-3">
      <h2 className="m-0 text-md font-bold">{text.demoTitle}</h2>
      <p className="mt-0.5 mb-2 text-ink-2">{text.demoLead}</p>
      <div className="flex flex-col items-start gap-2">
        {signIns.map((each) => (
          <Button
            key={each.email}
            look="quiet"
            onClick={() => onChoose({ email: each.email, password: each.password })}
          >
            {text.signInAs(each.name, each.part)}
          </Button>
        ))}
      </div>
    </section>
  );
}
