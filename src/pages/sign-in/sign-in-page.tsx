import { Link, Navigate, useNavigate, useSearchParams } from 'react-router-dom';
import { SignInForm } from '#client/features/session/components/sign-in-form.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { PublicLayout } from '#client/layouts/public-layout.tsx';
import { paths, safeNext } from '#client/lib/paths.ts';
import { sessionText as text } from '#client/text/session.ts';

export function SignInPage() {
  const session = useSession();
  const [search] = useSearchParams();
  const navigate = useNavigate();
  const next = safeNext(search.get('next'));
  if (session.person) return <Navigate to={next} replace />;
  return (
    <PublicLayout title={text.signIn} lead={text.signInLead}>
      <SignInForm
        demoSignIns={session.demoSignIns}
        onSignedIn={() => void navigate(next, { replace: true })}
      />
      <p className="mt-5 mb-0 text-sm">
        <Link to={paths.forgotPassword}>{text.forgot}</Link>
      </p>
      <p className="mt-1 mb-0 text-sm text-ink-2">{text.byInvitation}</p>
    </PublicLayout>
  );
}
