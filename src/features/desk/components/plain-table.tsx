import type { ReactNode } from 'react';
import { classNames } from '#client/components/class-names.ts';

export interface PlainColumn {
  readonly head: string;
  /** Words are aligned left, figures right. */
  readonly words?: boolean;
}

/** A table below the sheet that only shows: figures right under heads with their units. */
export function PlainTable({
  caption,
  columns,
  rows,
}: {
  caption: string;
  columns: readonly PlainColumn[];
  rows: ReadonlyArray<{ readonly key: string; readonly cells: readonly ReactNode[] }>;
}) {
  return (
    <table className="w-full">
      <caption className="sr-only">{caption}</caption>
      <thead>
        <tr>
          {columns.map(({ head, words }) => (
            <th
              key={head}
              scope="col"
              className={classNames(
                'border-b border-rule px-2 py-[5px] align-bottom text-sm font-semibold text-ink-2',
                words ? 'text-left' : 'text-right',
              )}
            >
              {head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map(({ key, cells }) => (
          <tr key={key}>
            {cells.map((cell, i) => (
              <td
                key={columns[i]!.head}
                className={classNames(
                  'border-b border-rule-2 px-2 py-[3px]',
                  columns[i]!.words
                    ? 'min-w-24 text-left text-sm last:min-w-56'
                    : 'text-right whitespace-nowrap',
                )}
              >
                {cell}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
