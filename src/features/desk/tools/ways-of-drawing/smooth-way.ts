import { sheetPx } from '#shared/compute/frames.ts';
import { smoothCurve } from '#shared/compute/geometry/smooth-curve.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { keptPoint } from '../line-points.ts';
import { clickedIndexes, type Growing } from './growing.ts';

/** How near a smooth line's vertices keep it to its curve, sheet pixels. */
const TOLERANCE = 0.2;
/** A span depends on two clicks before it and one after. */
const CLICKS_BEFORE = 3;

/** The points that a new click leaves as they are, and the smooth curve from the last of them on. */
export type SmoothEnd = { readonly kept: readonly SheetPoint[]; readonly curve: readonly SheetPoint[] };

/**
 * A line with its smooth end drawn anew, up to a new place or, without one, up to its own end: the last span is drawn
 * again because its direction at its end hangs on what comes after. What lies before is left as it is, also where it
 * was reshaped by hand.
 */
export function smoothEnd(growing: Growing, place: SheetPoint | null): SmoothEnd {
  const { points } = growing;
  const knots = smoothKnots(growing);
  const places = [...knots.map((i) => points[i]!), ...(place === null ? [] : [place])];
  const curve = smoothCurve(places, TOLERANCE).map(([x, y]) => keptPoint(sheetPx(x, y)));
  // The span before the last clicked place is drawn again, those before it are not.
  const from = knots[Math.max(0, knots.length - 2)]!;
  const start = points[from]!;
  const at = curve.findIndex(([x, y]) => x === start[0] && y === start[1]);
  return { kept: points.slice(0, from + 1), curve: curve.slice(Math.max(0, at)) };
}

/** The last clicked places of the smooth stretch at the growing end, by index; a line that was drawn otherwise begins at its end. */
function smoothKnots(growing: Growing): number[] {
  const indexes = clickedIndexes(growing);
  let from = indexes.length - 1;
  while (
    from > 0 &&
    indexes.length - from < CLICKS_BEFORE &&
    growing.clicked.get(indexes[from]!)?.way === 'smooth'
  ) {
    from -= 1;
  }
  return indexes.slice(from);
}

export function joined({ kept, curve }: SmoothEnd): SheetPoint[] {
  return [...kept, ...curve.slice(1)];
}
