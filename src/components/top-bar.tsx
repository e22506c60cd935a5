import { Fragment, type ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { paths } from '#client/lib/paths.ts';
import { commonText } from '#client/text/common.ts';

export interface TrailStep {
  label: string;
  /** Where it leads; the last step is the present page and leads nowhere. */
  to?: string | undefined;
}

/** The bar at the head of every signed-in page: mark, where one is, and what the page offers. */
export function TopBar({
  trail,
  end,
  isFull = false,
}: {
  trail: readonly TrailStep[];
  end?: ReactNode;
  /** Much stands at the end of the bar: on a telephone the mark then goes without its word. */
  isFull?: boolean;
}) {
  return (
    <header className="flex min-h-[46px] flex-wrap items-center gap-x-[18px] gap-y-1 border-b max-sm:gap-x-2 border-rule bg-film px-4 py-1 max-sm:px-3">
      <a href="#content" className="sr-only focus:not-sr-only">
        {commonText.skip}
      </a>
      <Mark withoutWord={isFull} />
      <Trail steps={trail} />
      <div className="ml-auto flex flex-wrap items-center gap-2.5 max-sm:gap-2">{end}</div>
    </header>
  );
}

export function Mark({ withoutWord = false }: { withoutWord?: boolean }) {
  return (
    <Link to={paths.dams} className="touch flex items-center gap-2 font-bold tracking-[0.01em] no-underline">
      <svg width="20" height="20" viewBox="0 0 20 20" aria-hidden="true" className="shrink-0">
        <g fill="none" stroke="currentColor" strokeWidth="1.8">
          <path d="M2 4c6 0 11 5 11 13M2 10c4 0 6 3 6 7" />
          <path d="M2 17h16" />
        </g>
      </svg>
      <span className={withoutWord ? 'max-sm:sr-only' : undefined}>{commonText.product}</span>
    </Link>
  );
}

/** Where one is: Dam / Drawing / Section. On a narrow screen it wraps below the mark. */
export function Trail({ steps }: { steps: readonly TrailStep[] }) {
  return (
    <nav aria-label={commonText.trail} className="min-w-0 text-ink-2 max-sm:order-last max-sm:basis-full">
      <ol className="m-0 flex list-none flex-wrap items-center gap-x-2 p-0">
        {steps.map((step, index) => (
          <Fragment key={step.label + (step.to ?? '')}>
            {index > 0 ? (
              <li aria-hidden="true" className="text-ink-2">
                /
              </li>
            ) : null}
            <li className="min-w-0 break-words">
              {step.to ? (
                <Link to={step.to} className="no-underline hover:underline">
                  {step.label}
                </Link>
              ) : (
                <span aria-current="page" className="font-semibold text-ink">
                  {step.label}
                </span>
              )}
            </li>
          </Fragment>
        ))}
      </ol>
    </nav>
  );
}
