import { type ReactNode, type RefObject, useEffect, useRef } from 'react';
import { useLocation } from 'react-router-dom';
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

/**
 * After going to another page the focus would be lost with the link that was pressed: it goes to the heading, so
 * that a screen reader says where one is and the keyboard goes on from there. The first load is left alone.
 */
function useFocusAfterNavigation(heading: RefObject<HTMLHeadingElement | null>): void {
  const isFirst = useLocation().key === 'default';
  useEffect(() => {
    const isLost = document.activeElement === null || document.activeElement === document.body;
    if (!isFirst && isLost) heading.current?.focus({ preventScroll: true });
  }, [isFirst, heading]);
}

/** The frame of a page that reads from top to bottom. */
export function Page({ title, heading, lead, action, narrow = false, children }: PageProps) {
  const headingRef = useRef<HTMLHeadingElement>(null);
  useFocusAfterNavigation(headingRef);
  return (
    <main
      id="content"
      tabIndex={-1}
      className={`mx-auto w-full px-6 pt-[22px] pb-10 max-sm:px-3 ${narrow ? 'max-w-[40rem]' : 'max-w-[77.5rem]'}`}
    >
      <title>{`${title} – ${commonText.product}`}</title>
      <div className="mb-[18px] flex flex-wrap items-end gap-x-4 gap-y-2">
        <div className="min-w-0">
          <h1 ref={headingRef} tabIndex={-1} className="m-0 text-xl font-bold break-words">
            {heading}
          </h1>
          {lead ? <div className="mt-1 text-ink-2">{lead}</div> : null}
        </div>
        {action ? <div className="ml-auto flex flex-wrap items-center gap-2">{action}</div> : null}
      </div>
      {children}
    </main>
  );
}
