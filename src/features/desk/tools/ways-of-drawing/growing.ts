import type { SheetPoint, TracedLine } from '#shared/contract/document.ts';
import type { ClickedPlace } from '../../model/clicked-places.ts';
import type { ToolContext } from '../tool-types.ts';

/** The line under way as it grows: its points with the growing end last, and which of them were clicked. */
export type Growing = {
  readonly lineId: string;
  readonly line: TracedLine;
  readonly atStart: boolean;
  readonly points: readonly SheetPoint[];
  readonly clicked: ReadonlyMap<number, ClickedPlace>;
};

/** The line under way; null when none is or it has no point. */
export function growingLine(context: ToolContext): Growing | null {
  const { draft } = context;
  const line = draft === null ? undefined : context.document.entities[draft.lineId]?.value;
  if (draft === null || line?.kind !== 'line' || line.points.length === 0) return null;
  const points = draft.atStart ? [...line.points].reverse() : line.points;
  return { ...draft, line, points, clicked: context.clicked.among(draft.lineId, points) };
}

/** The line with other points, which come with the growing end last. */
export function grown({ line, atStart }: Growing, points: readonly SheetPoint[]): TracedLine {
  return { ...line, points: atStart ? [...points].reverse() : [...points] };
}

export function endOf({ points }: Pick<Growing, 'points'>): SheetPoint {
  return points[points.length - 1]!;
}

/** The vertices that were clicked, the newest last; the end is always one. */
export function clickedIndexes({ points, clicked }: Growing): number[] {
  const last = points.length - 1;
  return [...[...clicked.keys()].filter((i) => i < last), last];
}
