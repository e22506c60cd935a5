import { type ComponentType, lazy, type ReactNode, Suspense } from 'react';
import { BrowserRouter, Route, Routes } from 'react-router-dom';
import { Loading } from './components/loading.tsx';
import { NotFoundPage } from './pages/error/not-found-page.tsx';
import { RouteErrors } from './pages/error/route-errors.tsx';
import { SignedIn } from './pages/signed-in/signed-in.tsx';

/** A page fetched when it is first visited; it shows "Loading…" in its own place and keeps its errors to itself. */
function page(path: string, load: () => Promise<ComponentType>): ReactNode {
  const Loaded = lazy(async () => ({ default: await load() }));
  const element = (
    <RouteErrors>
      <Suspense fallback={<Loading />}>
        <Loaded />
      </Suspense>
    </RouteErrors>
  );
  return <Route key={path} path={path} element={element} />;
}

const publicPages = [
  page('/sign-in', async () => (await import('./pages/sign-in/sign-in-page.tsx')).SignInPage),
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

const signedInPages = [
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
  <Route key="*" path="*" element={<NotFoundPage />} />,
];

const behindSignIn = (
  <RouteErrors>
    <SignedIn />
  </RouteErrors>
);

/**
 * The pages by their addresses. Pages fetch what they show through the query cache and no route loads or submits
 * anything, so the router without loaders is enough, which is 8 kB less for every first load.
 */
export function Pages() {
  return (
    <BrowserRouter>
      <Routes>
        {publicPages}
        <Route element={behindSignIn}>{signedInPages}</Route>
      </Routes>
    </BrowserRouter>
  );
}
