import type { ReactNode } from 'react';
import type { TrailStep } from '#client/components/top-bar.tsx';
import { AccountMenu } from '#client/features/session/components/account-menu.tsx';
import { AppLayout } from '#client/layouts/app-layout.tsx';

/** The layout of a signed-in page with the account at its right end. */
export function AppFrame({
  trail,
  end,
  children,
}: {
  trail: readonly TrailStep[];
  end?: ReactNode;
  children: ReactNode;
}) {
  return (
    <AppLayout
      trail={trail}
      end={
        <>
          {end}
          <AccountMenu />
        </>
      }
    >
      {children}
    </AppLayout>
  );
}
