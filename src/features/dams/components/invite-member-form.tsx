import { useState } from 'react';
import { InvitationFrame } from '#client/components/invitation-frame.tsx';
import { useNotice } from '#client/components/notice.tsx';
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
  const submit = () => {
    setIsMissing(roles.length === 0);
    if (roles.length > 0) invite.mutate({ email, roles }, { onSuccess: invited });
  };
  return (
    <InvitationFrame
      lead={settings.addPersonLead}
      emailLabel={settings.email}
      email={email}
      onEmail={setEmail}
      action={settings.invite}
      error={invite.error}
      busy={invite.isPending}
      onSubmit={submit}
    >
      <RoleChecks legend={settings.parts} roles={roles} onChange={setRoles} explained />
      {isMissing && roles.length === 0 ? (
        <p role="alert" className="m-0 text-sm text-wrong">
          {settings.onePart}
        </p>
      ) : null}
    </InvitationFrame>
  );
}
