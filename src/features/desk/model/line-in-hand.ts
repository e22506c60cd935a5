import type { SheetPoint } from '#shared/contract/document.ts';
import type { DeskState } from './desk-state.ts';
import type { LineInHand } from './live-help.ts';
import type { ToolOverlay } from './tool-overlay.ts';

/**
 * The line that is being drawn, with the place its next point would go as its last, or the one line of which a vertex is
 * being dragged; null when there is neither.
 */
export function lineInHand(
  { document, draft, preview }: Pick<DeskState, 'document' | 'draft' | 'preview'>,
  overlay: Pick<ToolOverlay, 'rubber' | 'path'>,
): LineInHand | null {
  const next = overlay.rubber?.at(-1);
  if (draft !== null && next !== undefined) {
    const value = document.entities[draft.lineId]?.value;
    if (value?.kind !== 'line') return null;
    const drawn = draft.atStart ? [...value.points].reverse() : value.points;
    // Along the ink or through a curve it does not run straight to the pointer.
    const points = [...drawn, ...(overlay.path ?? []), [next[0], next[1]] as SheetPoint];
    return { id: draft.lineId, value, points, index: points.length - 1 };
  }
  const [id, ...others] = Object.keys(preview);
  const value = id === undefined || others.length > 0 ? undefined : preview[id];
  const before = id === undefined ? undefined : document.entities[id]?.value;
  if (id === undefined || value?.kind !== 'line' || before?.kind !== 'line') return null;
  const index = value.points.findIndex((point, i) => !isAt(point, before.points[i]));
  return index === -1 ? null : { id, value, points: value.points, index };
}

function isAt(point: SheetPoint, other: SheetPoint | undefined): boolean {
  return other !== undefined && point[0] === other[0] && point[1] === other[1];
}
