import { HeadCell, Table } from '#client/components/table.tsx';
import { registerText as text } from '#client/text/register.ts';
import type { RegisterRow } from '#shared/contract/register.ts';
import { RegisterEntry } from './register-entry.tsx';

/** Rows of the register; on a telephone each is a block with its picture at the left. */
export function RegisterTable({ rows, isBusy }: { rows: readonly RegisterRow[]; isBusy: boolean }) {
  return (
    <div className={isBusy ? 'opacity-60' : undefined} aria-busy={isBusy}>
      <Table caption={text.caption}>
        <thead className="max-sm:sr-only">
          <tr>
            <HeadCell className="w-[5.5rem]">
              <span className="sr-only">{text.sheet}</span>
            </HeadCell>
            <HeadCell>{text.name}</HeadCell>
            <HeadCell>{text.dam}</HeadCell>
            <HeadCell>{text.state}</HeadCell>
            <HeadCell>{text.notes}</HeadCell>
            <HeadCell className="max-md:hidden">{text.who}</HeadCell>
            <HeadCell className="max-md:hidden">{text.when}</HeadCell>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <RegisterEntry key={row.id} row={row} />
          ))}
        </tbody>
      </Table>
    </div>
  );
}
