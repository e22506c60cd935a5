import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { CheckField, TextField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { commonText } from '#client/text/common.ts';
import { peopleText as text } from '#client/text/people.ts';
import { useInvitePerson } from '../api/people-queries.ts';

export function InvitePersonForm() {
  const [email, setEmail] = useState('');
  const [admin, setAdmin] = useState(false);
  const invite = useInvitePerson();
  const notice = useNotice();
  const invited = () => {
    notice(text.invited(email));
    setEmail('');
    setAdmin(false);
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!invite.isPending) invite.mutate({ email, admin }, { onSuccess: invited });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0 text-ink-2">{text.inviteLead}</p>
      <ProblemNote error={invite.error} />
      <TextField
        label={text.email}
        type="email"
        required
        autoComplete="off"
        error={fieldMessage(invite.error, 'email')}
        value={email}
        onChange={(event) => setEmail(event.target.value)}
      />
      <CheckField
        label={text.asAdmin}
        hint={text.asAdminHint}
        checked={admin}
        onChange={(event) => setAdmin(event.target.checked)}
      />
      <div>
        <Button type="submit" look="main" busy={invite.isPending} busyLabel={commonText.sending}>
          {text.sendInvitation}
        </Button>
      </div>
    </form>
  );
}
