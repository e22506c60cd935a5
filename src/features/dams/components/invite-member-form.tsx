import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { commonText } from '#client/text/common.ts';
import { damSettingsText as settings } from '#client/text/dam-settings.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import { useInviteMember } from '../api/dam-mutations.ts';
import { RoleChecks } from './role-checks.tsx';

export function InviteMemberForm({ damId }: { damId: string }) {
  const [email, setEmail] = useState('');
  const [roles, setRoles] = useState<DamRole[]>([]);
  const [isMissing, setIsMissing] = useState(false);
  const invite = useInviteMember(damId);
  const notice = useNotice();
  const invited = () => {
    notice(settings.inviteSent(email));
    setEmail('');
    setRoles([]);
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    setIsMissing(roles.length === 0);
    if (roles.length > 0 && !invite.isPending) invite.mutate({ email, roles }, { onSuccess: invited });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0 text-ink-2">{settings.addPersonLead}</p>
      <ProblemNote error={invite.error} />
      <TextField
        label={settings.email}
        type="email"
        required
        autoComplete="off"
        error={fieldMessage(invite.error, 'email')}
        value={email}
        onChange={(event) => setEmail(event.target.value)}
      />
      <RoleChecks legend={settings.parts} roles={roles} onChange={setRoles} explained />
      {isMissing && roles.length === 0 ? (
        <p role="alert" className="m-0 text-sm text-wrong">
          {settings.onePart}
        </p>
      ) : null}
      <div>
        <Button type="submit" look="main" busy={invite.isPending} busyLabel={commonText.sending}>
          {settings.invite}
        </Button>
      </div>
    </form>
  );
}
