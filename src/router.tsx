import { type ComponentType, Suspense } from 'react';
import { BrowserRouter, matchRoutes, type RouteObject, useRoutes } from 'react-router-dom';
import { FetchedPage, fetchable } from './components/fetched-page.tsx';
import { Loading } from './components/loading.tsx';
import { NotFoundPage } from './pages/error/not-found-page.tsx';
import { RouteErrors } from './pages/error/route-errors.tsx';
import { SignedIn } from './pages/signed-in/signed-in.tsx';

/** A page that keeps its errors to itself. The page before it stays until it is here. */
function page(path: string, load: () => Promise<ComponentType>): RouteObject {
  const of = fetchable(load);
  const element = (
    <RouteErrors>
      <Suspense fallback={<Loading />}>
        <FetchedPage key={path} of={of} />
      </Suspense>
    </RouteErrors>
  );
  return { path, element, handle: of.fetch };
}

const SIGN_IN = '/sign-in';

const publicPages = [
  page(SIGN_IN, async () => (await import('./pages/sign-in/sign-in-page.tsx')).SignInPage),
  page('/invitation', async () => (await import('./pages/invitation/invitation-page.tsx')).InvitationPage),
  page(
    '/forgot-password',
    async () => (await import('./pages/password/password-pages.tsx')).ForgotPasswordPage,
  ),
  page(
    '/reset-password',
    async () => (await import('./pages/password/password-pages.tsx')).ResetPasswordPage,
  ),
  page('/stop-digest', async () => (await import('./pages/stop-digest/stop-digest-page.tsx')).StopDigestPage),
];

const signedInPages: RouteObject[] = [
  page('/', async () => (await import('./pages/dams/dams-page.tsx')).DamsPage),
  page('/dams/new', async () => (await import('./pages/dams/new-dam-page.tsx')).NewDamPage),
  page('/register', async () => (await import('./pages/register/register-page.tsx')).RegisterPage),
  page('/dams/:damId', async () => (await import('./pages/dam/dam-page.tsx')).DamPage),
  page(
    '/dams/:damId/settings',
    async () => (await import('./pages/dam/dam-settings-page.tsx')).DamSettingsPage,
  ),
  page(
    '/dams/:damId/activity',
    async () => (await import('./pages/dam/dam-activity-page.tsx')).DamActivityPage,
  ),
  page(
    '/dams/:damId/seepage',
    async () => (await import('./pages/dam-seepage/dam-seepage-page.tsx')).DamSeepagePage,
  ),
  page('/dams/:damId/compare', async () => (await import('./pages/compare/compare-page.tsx')).ComparePage),
  page('/drawings/:drawingId', async () => (await import('./pages/drawing/drawing-page.tsx')).DrawingPage),
  page(
    '/drawings/:drawingId/carry/:sectionId',
    async () => (await import('./pages/carry-across/carry-page.tsx')).CarryPage,
  ),
  page('/nets/:netId', async () => (await import('./pages/desk/desk-page.tsx')).DeskPage),
  page('/revisions/:revisionId', async () => (await import('./pages/check/check-page.tsx')).CheckPage),
  page('/revisions/:revisionId/sheet', async () => (await import('./pages/sheet/sheet-page.tsx')).SheetPage),
  page('/people', async () => (await import('./pages/people/people-page.tsx')).PeoplePage),
  page('/mails', async () => (await import('./pages/mails/mails-page.tsx')).MailsPage),
  page(
    '/mails/templates',
    async () => (await import('./pages/mails/mail-templates-page.tsx')).MailTemplatesPage,
  ),
  page('/mails/:mailId', async () => (await import('./pages/mails/mail-page.tsx')).MailPage),
  page('/account', async () => (await import('./pages/account/account-page.tsx')).AccountPage),
  { path: '*', element: <NotFoundPage /> },
];

const behindSignIn = (
  <RouteErrors>
    <SignedIn />
  </RouteErrors>
);

const routes: RouteObject[] = [...publicPages, { element: behindSignIn, children: signedInPages }];

/** Fetches the page that will be shown at an address, so that the first thing shown is the page itself. */
export async function fetchFirstPage(pathname: string, isSignedIn: boolean): Promise<void> {
  const at = (address: string) => matchRoutes(routes, address)?.at(-1)?.route;
  const wanted = at(pathname);
  const isOpen = isSignedIn || publicPages.some((each) => each === wanted);
  // Where it cannot be fetched the page itself says so.
  await (isOpen ? wanted : at(SIGN_IN))?.handle?.().catch(() => {});
}

/**
 * The pages by their addresses. Pages fetch what they show through the query cache and no route loads or submits
 * anything, so the router without loaders is enough, which is 8 kB less for every first load.
 */
export function Pages() {
  return (
    <BrowserRouter>
      <Shown />
    </BrowserRouter>
  );
}

const Shown = () => useRoutes(routes);
