/** Where a block of words stands: with its upper left or, `side` right, its upper right corner. Screen pixels. */
export type BesidePlace = { readonly x: number; readonly y: number; readonly side: 'left' | 'right' };

const AWAY_PX = 18;
const EDGE_PX = 4;

type Room = { readonly widthPx: number; readonly heightPx: number };

/**
 * Beside the pointer at `at` in a view: to its right and below, else to the other side; where a view is too narrow for
 * either, as far to the right as there is room. `mostly`: as large as words mostly are, because by those of the moment they
 * would leap from side to side under a moving hand. `heightPx`: of the words of the moment.
 */
export function besidePlace(
  view: Room,
  [x, y]: readonly [number, number],
  mostly: Room,
  heightPx: number,
): BesidePlace {
  const fitsRight = x + AWAY_PX + mostly.widthPx <= view.widthPx;
  const fitsLeft = x - AWAY_PX - mostly.widthPx > 0;
  const fitsBelow = y + AWAY_PX + mostly.heightPx <= view.heightPx;
  const top = Math.round(Math.max(EDGE_PX, fitsBelow ? y + AWAY_PX : y - AWAY_PX - heightPx));
  if (!fitsRight && fitsLeft) return { x: Math.round(x - AWAY_PX), y: top, side: 'right' };
  const left = fitsRight ? x + AWAY_PX : Math.max(EDGE_PX, view.widthPx - EDGE_PX - mostly.widthPx);
  return { x: Math.round(left), y: top, side: 'left' };
}
