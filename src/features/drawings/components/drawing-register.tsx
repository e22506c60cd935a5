import { useSuspenseQuery } from '@tanstack/react-query';
import { Empty } from '#client/components/panel.tsx';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { drawingListQuery } from '../api/drawing-queries.ts';
import { DrawingEntry } from './drawing-entry.tsx';

interface DrawingRegisterProps {
  damId: string;
  archived: boolean;
  canUpload: boolean;
}

/** The register of a dam's drawings: thumbnail, title, sections and nets with their state. */
export function DrawingRegister({ damId, archived, canUpload }: DrawingRegisterProps) {
  const { data: drawings } = useSuspenseQuery(drawingListQuery(damId, archived));
  if (drawings.length === 0) return <Empty>{emptyText(archived, canUpload)}</Empty>;
  return (
    <ul className="m-0 list-none p-0">
      {inRegisterOrder(drawings).map((drawing) => (
        <DrawingEntry key={drawing.id} drawing={drawing} />
      ))}
    </ul>
  );
}

const byNumber = new Intl.Collator('en', { numeric: true });

/** By drawing number as a register is kept; what has no number yet stands first, newest first, to be given one. */
export function inRegisterOrder(drawings: readonly DrawingDto[]): DrawingDto[] {
  return [...drawings].sort(
    (a, b) =>
      byNumber.compare(a.number, b.number) ||
      byNumber.compare(a.revision, b.revision) ||
      b.uploadedAt.localeCompare(a.uploadedAt),
  );
}

function emptyText(archived: boolean, canUpload: boolean): string {
  if (archived) return text.nonePutAway;
  return canUpload ? text.none : text.noneReader;
}
