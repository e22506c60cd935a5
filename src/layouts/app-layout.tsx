import type { ReactNode } from 'react';
import { TopBar, type TrailStep } from '#client/components/top-bar.tsx';

interface AppLayoutProps {
  trail: readonly TrailStep[];
  /** Right end of the bar: the page's state and buttons, then the account. */
  end: ReactNode;
  isFull?: boolean;
  children: ReactNode;
}

/** Top bar and page of the signed-in product. */
export function AppLayout({ trail, end, isFull = false, children }: AppLayoutProps) {
  return (
    <>
      <TopBar trail={trail} end={end} isFull={isFull} />
      {children}
    </>
  );
}
