import { segmentAt } from '#shared/compute/geometry/hit-test.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NoteAnchor } from '#shared/contract/notes.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { middleOfCell } from './cell-places.ts';

/**
 * Where a note's balloon stands: with its point, on its line or profile at the place nearest to where it was set, in
 * the middle of its cell. What is gone leaves it where it was set; null for what has no place on the sheet.
 */
export function placeOfNote(
  anchor: NoteAnchor,
  document: FlowNetDocument,
  reading: NetReading | null,
): SheetPoint | null {
  switch (anchor.on) {
    case 'drawing':
    case 'titleBlock':
      return null;
    case 'place':
      return anchor.at;
    case 'cell':
      return middleOfCell(document, anchor) ?? anchor.at;
    case 'readingPoint':
      if (!document.entities[anchor.entityId]) return anchor.at;
      return reading?.points.find((point) => point.id === anchor.entityId)?.sheetAt ?? anchor.at;
    default:
      return nearestOf(document, anchor) ?? anchor.at;
  }
}

function nearestOf(
  document: FlowNetDocument,
  { entityId, at }: Extract<NoteAnchor, { on: 'line' | 'profile' }>,
): SheetPoint | null {
  const value = document.entities[entityId]?.value;
  const points =
    value?.kind === 'line'
      ? value.points
      : value?.kind === 'profile' && value.place.on === 'sheet'
        ? value.place.points
        : [];
  const hit = segmentAt(points, at, Number.POSITIVE_INFINITY);
  return hit ? [hit.at[0], hit.at[1]] : null;
}

/** True when what a note is about has been removed. */
export function isAnchorGone(anchor: NoteAnchor, document: FlowNetDocument): boolean {
  if (anchor.on === 'cell') return [...anchor.heads, ...anchor.flows].some((id) => !document.entities[id]);
  return 'entityId' in anchor && !document.entities[anchor.entityId];
}
