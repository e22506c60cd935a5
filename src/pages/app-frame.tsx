import { lazy, type ReactNode, Suspense } from 'react';
import type { TrailStep } from '#client/components/top-bar.tsx';
import { AccountMenu } from '#client/features/session/components/account-menu.tsx';
import { useSession } from '#client/features/session/hooks/use-session.ts';
import { AppLayout } from '#client/layouts/app-layout.tsx';

/** Fetched by administrators only. */
const Undelivered = lazy(async () => ({
  default: (await import('#client/features/mails/components/undelivered.tsx')).Undelivered,
}));

/** The layout of a signed-in page with the account at its right end. */
export function AppFrame({
  trail,
  end,
  isFull = false,
  children,
}: {
  trail: readonly TrailStep[];
  end?: ReactNode;
  isFull?: boolean;
  children: ReactNode;
}) {
  return (
    <AppLayout
      trail={trail}
      isFull={isFull}
      end={
        <>
          {end}
          <FailedMails />
          <AccountMenu />
        </>
      }
    >
      {children}
    </AppLayout>
  );
}

function FailedMails() {
  const session = useSession();
  if (!session.can.includes('mail.read')) return null;
  return (
    <Suspense fallback={null}>
      <Undelivered />
    </Suspense>
  );
}
