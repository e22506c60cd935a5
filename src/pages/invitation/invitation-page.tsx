import { Link, useLocation, useNavigate } from 'react-router-dom';
import { InvitationForm } from '#client/features/session/components/invitation-form.tsx';
import { PublicLayout } from '#client/layouts/public-layout.tsx';
import { paths } from '#client/lib/paths.ts';
import { problemText } from '#client/text/problems.ts';
import { sessionText as text } from '#client/text/session.ts';

/** The token stands in the fragment, which no browser sends and no log keeps. */
export function InvitationPage() {
  const { hash } = useLocation();
  const navigate = useNavigate();
  const token = hash.slice(1);
  if (token === '') return <InvitationInvalid />;
  return (
    <PublicLayout title={text.invitationTitle}>
      <InvitationForm
        key={token}
        token={token}
        onAccepted={() => void navigate(paths.dams, { replace: true })}
      />
    </PublicLayout>
  );
}

export function InvitationInvalid() {
  return (
    <PublicLayout title={problemText.linkInvalid}>
      <p className="mb-3">{text.invitationInvalid}</p>
      <p>
        <Link to={paths.signIn}>{text.toSignIn}</Link>
      </p>
    </PublicLayout>
  );
}
