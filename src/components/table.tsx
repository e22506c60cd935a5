import type { ReactNode, TdHTMLAttributes, ThHTMLAttributes } from 'react';
import { classNames } from './class-names.ts';

/** A ruled table that scrolls sideways inside its own frame on a narrow screen. */
export function Table({ caption, children }: { caption: string; children: ReactNode }) {
  return (
    // A region that scrolls must be reachable by keyboard.
    // biome-ignore lint/a11y/noNoninteractiveTabindex: the scrolling frame has no other way in for the keyboard
    <section aria-label={caption} tabIndex={0} className="overflow-x-auto">
      <table className="w-full">
        <caption className="sr-only">{caption}</caption>
        {children}
      </table>
    </section>
  );
}

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
