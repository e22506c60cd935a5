/** Addresses of the pages, in one place. */
export const paths = {
  dams: '/',
  newDam: '/dams/new',
  register: (damId?: string) => (damId === undefined ? '/register' : `/register?dam=${damId}`),
  dam: (damId: string) => `/dams/${damId}`,
  damSettings: (damId: string) => `/dams/${damId}/settings`,
  damActivity: (damId: string) => `/dams/${damId}/activity`,
  damSeepage: (damId: string) => `/dams/${damId}/seepage`,
  /** Two nets of a dam beside one another; either may be left to be chosen there. */
  compare: (damId: string, one?: ComparedSide, other?: ComparedSide) =>
    `/dams/${damId}/compare${compareQuery(one, other)}`,
  drawing: (drawingId: string, pageNumber?: number) =>
    pageNumber === undefined ? `/drawings/${drawingId}` : `/drawings/${drawingId}?sheet=${pageNumber}`,
  carryAcross: (drawingId: string, sectionId: string) => `/drawings/${drawingId}/carry/${sectionId}`,
  net: (netId: string) => `/nets/${netId}`,
  revision: (revisionId: string) => `/revisions/${revisionId}`,
  revisionSheet: (revisionId: string) => `/revisions/${revisionId}/sheet`,
  people: '/people',
  mails: '/mails',
  failedMails: '/mails?state=failed',
  mailTemplates: '/mails/templates',
  mail: (mailId: string) => `/mails/${mailId}`,
  account: '/account',
  signIn: '/sign-in',
  forgotPassword: '/forgot-password',
} as const;

/** A net as it is drawn now, or as a revision has frozen it. */
export type ComparedSide = { readonly kind: 'net' | 'revision'; readonly id: string };

function compareQuery(one: ComparedSide | undefined, other: ComparedSide | undefined): string {
  const query = new URLSearchParams();
  if (one) query.set('one', `${one.kind}:${one.id}`);
  if (other) query.set('other', `${other.kind}:${other.id}`);
  return query.size === 0 ? '' : `?${query}`;
}

/** Sign-in that comes back to where it was asked for. */
export function signInAndBack(from: { pathname: string; search: string; hash: string }): string {
  const here = `${from.pathname}${from.search}${from.hash}`;
  return here === paths.dams ? paths.signIn : `${paths.signIn}?next=${encodeURIComponent(here)}`;
}

/** The page to go to after signing in: an address within this site only, never one of another host. */
export function safeNext(next: string | null): string {
  if (next === null || !/^\/(?![/\\])/.test(next)) return paths.dams;
  return next.startsWith(paths.signIn) ? paths.dams : next;
}
