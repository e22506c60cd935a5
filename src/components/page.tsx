import type { ReactNode } from 'react';
import { commonText } from '#client/text/common.ts';

interface PageProps {
  /** For the browser's tab; the product's name is added. */
  title: string;
  heading: ReactNode;
  /** One line below the heading. */
  lead?: ReactNode;
  /** At the right of the heading. */
  action?: ReactNode;
  narrow?: boolean;
  children: ReactNode;
}

/** The frame of a page that reads from top to bottom. */
export function Page({ title, heading, lead, action, narrow = false, children }: PageProps) {
  return (
    <main
      id="content"
      className={`mx-auto w-full px-6 pt-[22px] pb-10 max-sm:px-3 ${narrow ? 'max-w-[640px]' : 'max-w-[1240px]'}`}
    >
      <title>{`${title} – ${commonText.product}`}</title>
      <div className="mb-[18px] flex flex-wrap items-end gap-x-4 gap-y-2">
        <div className="min-w-0">
          <h1 className="m-0 text-xl font-bold break-words">{heading}</h1>
          {lead ? <div className="mt-1 text-ink-2">{lead}</div> : null}
        </div>
        {action ? <div className="ml-auto flex flex-wrap items-center gap-2">{action}</div> : null}
      </div>
      {children}
    </main>
  );
}
