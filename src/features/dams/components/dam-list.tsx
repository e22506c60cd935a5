import { useSuspenseQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { Empty } from '#client/components/panel.tsx';
import { Cell, HeadCell, Table } from '#client/components/table.tsx';
import { paths } from '#client/lib/paths.ts';
import { damsText as text } from '#client/text/dams.ts';
import type { DamDto } from '#shared/contract/dams.ts';
import { damListQuery } from '../api/dam-queries.ts';
import { levelText } from './dam-facts.tsx';

/** The dams the reader belongs to, as a table. */
export function DamList({ archived, canCreate }: { archived: boolean; canCreate: boolean }) {
  const { data: dams } = useSuspenseQuery(damListQuery(archived));
  if (dams.length === 0) return <Empty>{emptyText(archived, canCreate)}</Empty>;
  return (
    <Table caption={text.yours}>
      <thead>
        <tr>
          <HeadCell>{text.dam}</HeadCell>
          <HeadCell numeric className="max-sm:hidden">
            {text.fullSupply}
          </HeadCell>
          <HeadCell numeric>{text.drawings}</HeadCell>
          <HeadCell>{text.openNotes}</HeadCell>
          <HeadCell className="max-sm:hidden">{text.yourPart}</HeadCell>
        </tr>
      </thead>
      <tbody>
        {dams.map((dam) => (
          <DamRow key={dam.id} dam={dam} />
        ))}
      </tbody>
    </Table>
  );
}

function emptyText(archived: boolean, canCreate: boolean): string {
  if (archived) return text.nonePutAway;
  return canCreate ? text.noneAdmin : text.none;
}

function DamRow({ dam }: { dam: DamDto }) {
  return (
    <tr className="hover:bg-hover">
      <Cell>
        <Link to={paths.dam(dam.id)} className="touch inline-flex items-center font-semibold">
          {dam.name}
        </Link>
      </Cell>
      <Cell numeric className="whitespace-nowrap max-sm:hidden">
        {levelText(dam.fullSupplyLevel, dam)}
      </Cell>
      <Cell numeric>{dam.drawingCount}</Cell>
      <Cell className={dam.openNoteCount > 0 ? 'font-semibold text-attention' : 'text-ink-2'}>
        {dam.openNoteCount > 0 ? text.openNoteCount(dam.openNoteCount) : '–'}
        {dam.unreadNoteCount > 0 ? `, ${text.unreadNoteCount(dam.unreadNoteCount)}` : ''}
      </Cell>
      <Cell className="text-ink-2 max-sm:hidden">{text.roles(dam.roles) || '–'}</Cell>
    </tr>
  );
}
