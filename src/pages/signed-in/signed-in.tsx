import { lazy, Suspense, useEffect, useState } from 'react';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { useSessionEnd } from '#client/features/session/hooks/use-session-end.ts';
import { signInAndBack } from '#client/lib/paths.ts';

const loadSignInAgain = () => import('#client/features/session/components/sign-in-again.tsx');
const SignInAgain = lazy(async () => ({ default: (await loadSignInAgain()).SignInAgain }));
/** Not with the first load, but soon after it: when the session ends, the server may hold a newer client already. */
const FETCH_AHEAD_MS = 4000;

/** Everything behind the sign-in. A session that ends while a page is open is renewed over the page. */
export function SignedIn() {
  const location = useLocation();
  const session = useSession();
  const ended = useSessionEnd();
  const [person, setPerson] = useState(session.person);
  if (session.person && session.person.id !== person?.id) setPerson(session.person);
  useEffect(() => {
    // Without a connection it is fetched when it is needed.
    const timer = setTimeout(() => loadSignInAgain().catch(() => {}), FETCH_AHEAD_MS);
    return () => clearTimeout(timer);
  }, []);
  if (!person) return <Navigate to={signInAndBack(location)} replace />;
  return (
    <>
      <Outlet />
      <Suspense>{ended || !session.person ? <SignInAgain person={person} /> : null}</Suspense>
    </>
  );
}
