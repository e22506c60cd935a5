import { useState } from 'react';
import { CheckField } from '#client/components/field.tsx';
import { InvitationFrame } from '#client/components/invitation-frame.tsx';
import { useNotice } from '#client/components/notice.tsx';
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
  return (
    <InvitationFrame
      lead={text.inviteLead}
      emailLabel={text.email}
      email={email}
      onEmail={setEmail}
      action={text.sendInvitation}
      error={invite.error}
      busy={invite.isPending}
      onSubmit={() => invite.mutate({ email, admin }, { onSuccess: invited })}
    >
      <CheckField
        label={text.asAdmin}
        hint={text.asAdminHint}
        checked={admin}
        onChange={(event) => setAdmin(event.target.checked)}
      />
    </InvitationFrame>
  );
}
