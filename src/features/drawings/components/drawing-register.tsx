import { useSuspenseQuery } from '@tanstack/react-query';
import { Empty } from '#client/components/panel.tsx';
import { drawingsText as text } from '#client/text/drawings.ts';
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
      {drawings.map((drawing) => (
        <DrawingEntry key={drawing.id} drawing={drawing} />
      ))}
    </ul>
  );
}

function emptyText(archived: boolean, canUpload: boolean): string {
  if (archived) return text.nonePutAway;
  return canUpload ? text.none : text.noneReader;
}
