import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { simplifiedStroke } from '#shared/compute/geometry/simplify-stroke.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { keptPoint } from '../line-points.ts';
import type { ToolContext, ToolState } from '../tool-types.ts';

export type Sketching = Extract<ToolState, { at: 'sketching' }>;

/** How well a hand follows what it means, screen pixels. */
const HAND_PX = 1.2;
/** Finer than this the sheet's own pixels tell nothing. */
const LEAST_ACCURACY = 0.4;
/** A stroke begun so near the end of the line goes on from that end, screen pixels. */
const JOINS_PX = 14;
/** A hand that stays within this has clicked; a finger rolls more than a mouse. */
const STEADY_PX = 4;
const STEADY_TOUCH_PX = 10;
const TOUCH_REACH_PX = 12;

export function beginSketch(at: SheetPx): Sketching {
  return { at: 'sketching', places: [at] };
}

export function goOnSketching(state: Sketching, at: SheetPx): Sketching {
  const last = state.places.at(-1);
  if (last !== undefined && last[0] === at[0] && last[1] === at[1]) return state;
  return { at: 'sketching', places: [...state.places, at] };
}

/** True when the hand has hardly moved: then it has clicked, and the click follows by itself. */
export function isClick({ places }: Sketching, { zoom, reachPx }: ToolContext): boolean {
  const [first] = places;
  const steady = reachPx > TOUCH_REACH_PX ? STEADY_TOUCH_PX : STEADY_PX;
  return places.every((at) => Math.hypot(at[0] - first![0], at[1] - first![1]) * zoom <= steady);
}

/**
 * What a stroke adds to a line, as few vertices: from the end of the line where it begins there, else from `start`, to
 * `last`, where each of the two is where the stroke's end snaps to.
 */
export function strokePoints(
  { places }: Sketching,
  end: SheetPoint | null,
  [start, last]: readonly [SheetPx, SheetPx],
  { zoom }: ToolContext,
): SheetPoint[] {
  const joins = end !== null && Math.hypot(start[0] - end[0], start[1] - end[1]) * zoom <= JOINS_PX;
  const first = joins ? sheetPx(...end) : start;
  const accuracy = Math.max(LEAST_ACCURACY, HAND_PX / zoom);
  const stroke = [first, ...places.slice(1, -1), last].map(([x, y]): SheetPoint => [x, y]);
  const line = simplifiedStroke(stroke, accuracy);
  const points = line.map(([x, y]) => keptPoint(sheetPx(x, y)));
  return joins ? points.slice(1) : points;
}
