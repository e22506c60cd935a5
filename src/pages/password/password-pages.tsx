import { useState } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { ResetRequestForm, SetPasswordForm } from '#client/features/session/components/reset-forms.tsx';
import { PublicLayout } from '#client/layouts/public-layout.tsx';
import { paths } from '#client/lib/paths.ts';
import { problemText } from '#client/text/problems.ts';
import { sessionText as text } from '#client/text/session.ts';

export function ForgotPasswordPage() {
  return (
    <PublicLayout title={text.resetTitle}>
      <ResetRequestForm />
      <p className="mt-5 mb-0 text-sm">
        <Link to={paths.signIn}>{text.toSignIn}</Link>
      </p>
    </PublicLayout>
  );
}

/** The token stands in the fragment, which no browser sends and no log keeps. */
export function ResetPasswordPage() {
  const token = useLocation().hash.slice(1);
  const [isSet, setIsSet] = useState(false);
  if (isSet)
    return (
      <PublicLayout title={text.setTitle}>
        <p role="status" className="mb-3">
          {text.passwordSet}
        </p>
        <Link to={paths.signIn}>{text.toSignIn}</Link>
      </PublicLayout>
    );
  if (token === '')
    return (
      <PublicLayout title={problemText.linkInvalid}>
        <p className="mb-3">{text.resetInvalid}</p>
        <Link to={paths.forgotPassword}>{text.askAgain}</Link>
      </PublicLayout>
    );
  return (
    <PublicLayout title={text.setTitle}>
      <SetPasswordForm token={token} onSet={() => setIsSet(true)} />
      <p className="mt-5 mb-0 text-sm">
        <Link to={paths.forgotPassword}>{text.askAgain}</Link>
      </p>
    </PublicLayout>
  );
}
