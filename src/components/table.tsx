import type { ReactNode, TdHTMLAttributes, ThHTMLAttributes } from 'react';
import { classNames } from './class-names.ts';

interface TableProps {
  caption: string;
  /** On a narrow screen each row becomes a block of its own, for tables with buttons in their rows. */
  stacked?: boolean;
  children: ReactNode;
}

/** A ruled table that scrolls sideways inside its own frame on a narrow screen, or is stacked there. */
export function Table({ caption, stacked = false, children }: TableProps) {
  return (
    <section aria-label={caption} className="overflow-x-auto">
      <table className={classNames('w-full', stacked && STACKED)}>
        <caption className="sr-only">{caption}</caption>
        {children}
      </table>
    </section>
  );
}

const STACKED =
  'max-sm:block max-sm:[&_thead]:sr-only max-sm:[&_tbody]:block max-sm:[&_tr]:block max-sm:[&_tr]:border-b max-sm:[&_tr]:border-rule max-sm:[&_tr]:py-1.5 max-sm:[&_td]:block max-sm:[&_td]:border-b-0 max-sm:[&_td]:py-0.5 max-sm:[&_td]:text-left';

type Numeric = { numeric?: boolean };

export function HeadCell({ numeric, className, ...rest }: ThHTMLAttributes<HTMLTableCellElement> & Numeric) {
  return (
    <th
      scope="col"
      className={classNames(
        'border-b border-rule px-3.5 py-[5px] text-sm font-semibold whitespace-nowrap text-ink-2',
        numeric ? 'text-right' : 'text-left',
        className,
      )}
      {...rest}
    />
  );
}

export function Cell({ numeric, className, ...rest }: TdHTMLAttributes<HTMLTableCellElement> & Numeric) {
  return (
    <td
      className={classNames('border-b border-rule-2 px-3.5 py-[5px]', numeric && 'text-right', className)}
      {...rest}
    />
  );
}
