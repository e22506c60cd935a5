import type { ReactNode } from 'react';
import { Mark } from '#client/components/top-bar.tsx';
import { commonText } from '#client/text/common.ts';

/** The narrow sheet of pages that need no sign-in. */
export function PublicLayout({
  title,
  lead,
  children,
}: {
  title: string;
  lead?: string;
  children: ReactNode;
}) {
  return (
    <main id="content" className="mx-auto w-full max-w-[26.25rem] px-3 pt-[9vh] pb-10">
      <title>{`${title} – ${commonText.product}`}</title>
      <div className="border border-ink bg-film">
        <div className="border-b border-ink px-4 py-2">
          <Mark />
        </div>
        <div className="p-4">
          <h1 className="m-0 text-lg font-bold">{title}</h1>
          {lead ? <p className="mt-1 mb-0 text-ink-2">{lead}</p> : null}
          <div className="mt-4">{children}</div>
        </div>
      </div>
    </main>
  );
}
