import type { ReactNode } from 'react';

const CELL = 'border-b border-rule-2 px-1.5 py-[3px]';

/** A small table in the margin: the first column names the row, the others are figures aligned right. */
export function MarginTable({
  caption,
  heads,
  children,
}: {
  caption: string;
  heads: readonly string[];
  children: ReactNode;
}) {
  return (
    <div className="overflow-x-auto">
      <table className="w-full text-sm">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr>
            {heads.map((head, i) =>
              // A column without a head holds words that need none; an empty head would be read out.
              head === '' ? (
                <td key={head} className="border-b border-rule" />
              ) : (
                <th
                  key={head}
                  scope="col"
                  className={`border-b border-rule px-1.5 py-[3px] align-bottom font-semibold text-ink-2 ${i === 0 ? 'text-left' : 'text-right'}`}
                >
                  {head}
                </th>
              ),
            )}
          </tr>
        </thead>
        <tbody>{children}</tbody>
      </table>
    </div>
  );
}

export function RowHead({ children, strong = false }: { children: ReactNode; strong?: boolean }) {
  return (
    <th scope="row" className={`${CELL} text-left ${strong ? 'font-semibold' : 'font-normal'}`}>
      {children}
    </th>
  );
}

export function FigureCell({ children, look = '' }: { children: ReactNode; look?: string }) {
  return <td className={`${CELL} text-right whitespace-nowrap ${look}`}>{children}</td>;
}
