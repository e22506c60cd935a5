import type { ReactNode } from 'react';

/** One matter of a pane in the margin, under a heading of its own. */
export function MarginSection({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="flex flex-col gap-1.5 border-t border-rule pt-2.5 first:border-t-0 first:pt-0">
      <h3 className="m-0 text-base font-semibold">{title}</h3>
      {children}
    </section>
  );
}

/** A sentence beside what it is about, in the lighter ink. */
export function Aside({ children }: { children: ReactNode }) {
  return <p className="m-0 text-sm text-ink-2">{children}</p>;
}
