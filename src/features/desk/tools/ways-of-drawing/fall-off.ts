import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { bendsOf, DENSE, isFirm, reshaped } from '#shared/compute/geometry/reshape.ts';
import type { SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { type ClickedPlace, wayOfPiece } from '../../model/clicked-places.ts';
import { keptPoint } from '../line-points.ts';
import type { ToolContext } from '../tool-types.ts';

/** Bends that were not clicked hold a line only so far from the vertex dragged: as far apart as clicks are, screen pixels. */
const LEAST_REACH_PX = 48;
/** Vertices nearer than this on screen are not told apart by eye. */
const DENSE_PX = 12;

/**
 * A line with one vertex dragged to a place. Of a smooth, freehand or followed line the vertices about it follow, up to
 * the next clicked place or bend on either side, so that the line stays a line of one sweep.
 */
export function withVertexDragged(
  context: ToolContext,
  lineId: string,
  line: TracedLine,
  index: number,
  place: SheetPx,
): TracedLine {
  const { points } = line;
  const clicked = context.clicked.among(lineId, points);
  const dense = Math.max(DENSE, DENSE_PX / context.zoom);
  const bends = bendsOf(points, dense);
  const reach = LEAST_REACH_PX / context.zoom;
  const along = distancesFrom(points, index);
  const isFixed = (i: number) =>
    clicked.has(i) ||
    (!isSmooth(clicked, i) && (isFirm(points, i, dense) || (bends.has(i) && along[i]! >= reach)));
  const moved = reshaped(points, index, keptPoint(place), isFixed);
  // Vertices that stay keep their figures, also those of a file that are finer than ours.
  return {
    ...line,
    points: moved.map((at, i) => (at === points[i] ? points[i]! : keptPoint(sheetPx(...at)))),
  };
}

/** The place to which a vertex was dragged, to be remembered: from then on it holds the line there. */
export function draggedPlace(
  context: ToolContext,
  lineId: string,
  { points }: TracedLine,
  index: number,
): ClickedPlace[] {
  const at = points[index];
  const before = context.document.entities[lineId]?.value;
  const clicked = context.clicked.among(lineId, before?.kind === 'line' ? before.points : points);
  return at === undefined || clicked.size === 0 ? [] : [{ at, way: wayOfPiece(clicked, index) }];
}

function isSmooth(clicked: ReadonlyMap<number, ClickedPlace>, index: number): boolean {
  return wayOfPiece(clicked, index) === 'smooth';
}

/** Distance along the line of every vertex from one of them. */
function distancesFrom(points: readonly SheetPoint[], index: number): number[] {
  let walked = 0;
  const along = points.map((at, i) => {
    const before = points[i - 1];
    if (before !== undefined) walked += Math.hypot(at[0] - before[0], at[1] - before[1]);
    return walked;
  });
  return along.map((distance) => Math.abs(distance - (along[index] ?? 0)));
}
