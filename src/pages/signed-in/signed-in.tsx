import { Suspense, useState } from 'react';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { Loading } from '#client/components/loading.tsx';
import { SignInAgain } from '#client/features/session/components/sign-in-again.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { useSessionEnd } from '#client/features/session/hooks/use-session-end.ts';
import { signInAndBack } from '#client/lib/paths.ts';

/** Everything behind the sign-in. A session that ends while a page is open is renewed over the page. */
export function SignedIn() {
  const location = useLocation();
  const session = useSession();
  const ended = useSessionEnd();
  const [person, setPerson] = useState(session.person);
  if (session.person && session.person.id !== person?.id) setPerson(session.person);
  if (!person) return <Navigate to={signInAndBack(location)} replace />;
  return (
    <>
      <Suspense fallback={<Loading />}>
        <Outlet />
      </Suspense>
      {ended || !session.person ? <SignInAgain person={person} /> : null}
    </>
  );
}
