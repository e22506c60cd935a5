import type { SheetPoint } from '#shared/contract/document.ts';
import { type ClickedPlace, wayOfPiece } from '../model/clicked-places.ts';

/** Handles nearer to one another than this on screen run into a band. */
const APART_PX = 14;

/**
 * Vertices of a line that get a handle, by index: of a smooth piece those that were clicked, of others as many as can be
 * told apart on screen. Those without one can be taken hold of all the same. `chosen`: a vertex that is always shown.
 */
export function handledVertices(
  points: readonly SheetPoint[],
  clicked: ReadonlyMap<number, ClickedPlace>,
  zoom: number,
  chosen: number | null,
): number[] {
  const last = points.length - 1;
  const shown: number[] = [];
  let before: SheetPoint | null = null;
  points.forEach((at, i) => {
    const isKept = i === 0 || i === last || i === chosen || clicked.has(i);
    const near = before !== null && Math.hypot(at[0] - before[0], at[1] - before[1]) * zoom < APART_PX;
    if (!isKept && (near || wayOfPiece(clicked, i) === 'smooth')) return;
    shown.push(i);
    before = at;
  });
  return shown;
}
