import type { ReactNode } from 'react';

export function AidTitle({ children }: { children: ReactNode }) {
  return <h2 className="mt-0 mb-1.5 text-base font-semibold">{children}</h2>;
}

export function AidHint({ children }: { children: ReactNode }) {
  return <p className="mt-2 mb-0 text-sm text-ink-2">{children}</p>;
}
