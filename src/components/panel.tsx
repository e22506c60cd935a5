import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

interface PanelProps {
  title: ReactNode;
  /** At the right of the head: the register's button. */
  action?: ReactNode;
  /** `register`: ruled in ink as on a drawing sheet. `side`: hairlines. */
  look?: 'register' | 'side';
  children: ReactNode;
  className?: string;
}

/** A ruled block with a head: registers as on a drawing sheet. */
export function Panel({ title, action, look = 'side', children, className }: PanelProps) {
  const register = look === 'register';
  return (
    <section className={classNames('border bg-film', register ? 'border-ink' : 'border-rule', className)}>
      <div
        className={classNames(
          'flex min-h-[42px] flex-wrap items-center gap-x-3 gap-y-2 border-b px-3.5 py-2.5',
          register ? 'border-ink' : 'border-rule',
        )}
      >
        <h2 className="m-0 text-md font-bold">{title}</h2>
        {action ? <div className="ml-auto flex flex-wrap items-center gap-2">{action}</div> : null}
      </div>
      {children}
    </section>
  );
}

/** Hairline list inside a panel. */
export function PanelList({ children }: { children: ReactNode }) {
  return <ul className="m-0 list-none px-3.5 pt-1.5 pb-2.5">{children}</ul>;
}
export function PanelItem({ children }: { children: ReactNode }) {
  return <li className="border-b border-rule-2 py-[5px] last:border-b-0">{children}</li>;
}

/** What an empty list says: what is missing and what to do next. */
export function Empty({ children }: { children: ReactNode }) {
  return <div className="px-3.5 py-4 text-ink-2">{children}</div>;
}
