import { Dialog } from '#client/components/dialog.tsx';
import { paths } from '#client/lib/paths.ts';
import { sessionText as text } from '#client/text/session.ts';
import type { SessionDto } from '#shared/contract/people.ts';
import { SignInForm } from './sign-in-form.tsx';

/**
 * Lies over the page when the session has ended, so that what was typed and traced stays where it is. When
 * somebody else signs in, the page is loaded anew: nothing of the one goes out under the name of the other.
 */
export function SignInAgain({ person }: { person: NonNullable<SessionDto['person']> }) {
  const signedIn = (session: SessionDto) => {
    if (session.person?.id !== person.id) window.location.assign(paths.dams);
  };
  return (
    <Dialog title={text.againTitle}>
      <p className="mt-0 mb-3">{text.againLead}</p>
      <SignInForm demoSignIns={[]} email={person.email} onSignedIn={signedIn} />
      <p className="mt-4 mb-0 text-sm">
        <a href={paths.signIn}>{text.leave}</a>
      </p>
    </Dialog>
  );
}
