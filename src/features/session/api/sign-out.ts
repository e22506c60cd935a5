import { send } from '#client/lib/http.ts';
import { paths } from '#client/lib/paths.ts';

/** Ends the session. A full load of the sign-in page, reached or not, leaves nothing of this person in memory. */
export function signOut(): void {
  void send('DELETE', '/session')
    .catch(() => {
      // Without an answer the sign-in page shows who is still signed in.
    })
    .finally(() => window.location.assign(paths.signIn));
}
