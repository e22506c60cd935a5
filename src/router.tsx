import { type ComponentType, Suspense } from 'react';
import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { Loading } from './components/loading.tsx';
import { NotFoundPage } from './pages/error/not-found-page.tsx';
import { RouteError } from './pages/error/route-error.tsx';
import { SignedIn } from './pages/signed-in/signed-in.tsx';

/** A page fetched when it is first visited; it shows "Loading…" in its own place and keeps its errors to itself. */
function page(path: string, load: () => Promise<ComponentType>): RouteObject {
  return {
    path,
    ErrorBoundary: RouteError,
    HydrateFallback: Loading,
    lazy: async () => {
      const Loaded = await load();
      return {
        element: (
          <Suspense fallback={<Loading />}>
            <Loaded />
          </Suspense>
        ),
      };
    },
  };
}

const publicPages: RouteObject[] = [
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
];

const signedInPages: RouteObject[] = [
  page('/', async () => (await import('./pages/dams/dams-page.tsx')).DamsPage),
  page('/dams/new', async () => (await import('./pages/dams/new-dam-page.tsx')).NewDamPage),
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
  page('/mails/:mailId', async () => (await import('./pages/mails/mail-page.tsx')).MailPage),
  page('/account', async () => (await import('./pages/account/account-page.tsx')).AccountPage),
  { path: '*', Component: NotFoundPage },
];

export function createRouter() {
  return createBrowserRouter([
    ...publicPages,
    { Component: SignedIn, ErrorBoundary: RouteError, HydrateFallback: Loading, children: signedInPages },
  ]);
}
