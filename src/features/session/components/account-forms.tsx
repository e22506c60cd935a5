import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { paths } from '#client/lib/paths.ts';
import { commonText } from '#client/text/common.ts';
import { sessionText as text } from '#client/text/session.ts';
import { useChangePassword, useEndAllSessions, useRename } from '../api/session-mutations.ts';
import { NewPasswordField } from './new-password-field.tsx';

export function NameForm({ name: known }: { name: string }) {
  const [name, setName] = useState(known);
  const rename = useRename();
  const notice = useNotice();
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!rename.isPending) rename.mutate({ name }, { onSuccess: () => notice(text.nameSaved) });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <ProblemNote error={rename.error} />
      <TextField
        label={text.name}
        hint={text.nameHint}
        autoComplete="name"
        required
        maxLength={200}
        error={fieldMessage(rename.error, 'name')}
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      <div>
        <Button type="submit" busy={rename.isPending}>
          {commonText.save}
        </Button>
      </div>
    </form>
  );
}

export function PasswordForm() {
  const [current, setCurrent] = useState('');
  const [next, setNext] = useState('');
  const change = useChangePassword();
  const notice = useNotice();
  const changed = () => {
    setCurrent('');
    setNext('');
    notice(text.passwordChanged);
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!change.isPending) change.mutate({ current, next }, { onSuccess: changed });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <ProblemNote error={change.error} />
      <TextField
        label={text.currentPassword}
        type="password"
        autoComplete="current-password"
        required
        value={current}
        onChange={(event) => setCurrent(event.target.value)}
      />
      <NewPasswordField
        path="next"
        label={text.newPassword}
        value={next}
        onChange={setNext}
        error={change.error}
      />
      <div>
        <Button type="submit" busy={change.isPending}>
          {text.changePassword}
        </Button>
      </div>
    </form>
  );
}

export function EndAllSessions() {
  const endAll = useEndAllSessions();
  return (
    <div className="flex flex-col gap-3">
      <p className="m-0">{text.endAllLead}</p>
      <ProblemNote error={endAll.error} />
      <div>
        <Button
          busy={endAll.isPending}
          onClick={() => endAll.mutate(undefined, { onSuccess: () => window.location.assign(paths.signIn) })}
        >
          {text.endAll}
        </Button>
      </div>
    </div>
  );
}
