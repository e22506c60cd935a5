/**
 * What the browser knows of its session outside React: the token that every write carries, whose session it is,
 * and two moments others wait for. The saving queue holds its work at `signedOut` and goes on at `signedIn`.
 */
export type SignInMoment = 'signedOut' | 'signedIn';

let csrfToken = '';
let personId: string | null = null;
const listeners = new Set<(moment: SignInMoment) => void>();

export const currentCsrfToken = (): string => csrfToken;
/** Whose page this is, also after the session has ended: what is on it may go out under this name only. */
export const currentPersonId = (): string | null => personId;

export function rememberSession(session: { csrfToken: string; person: { id: string } | null }): void {
  csrfToken = session.csrfToken;
  personId = session.person?.id ?? personId;
}

export function announce(moment: SignInMoment): void {
  for (const listener of [...listeners]) listener(moment);
}

/** Calls back at each sign-in and whenever an answer says that the session has ended; returns the way to stop. */
export function onSignInMoment(listener: (moment: SignInMoment) => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
