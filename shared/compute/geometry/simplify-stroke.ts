import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import { withoutTremor } from '#shared/compute/geometry/tremor.ts';

/** Places of a stroke nearer to one another than this part of the hand's accuracy tell nothing of their own. */
const APART = 0.5;
const TOLERANCE = 0.5;

/**
 * A stroke drawn freehand as a line of few vertices: the tremor of the hand taken off, then vertices left out while the
 * line stays within half the accuracy of the hand. `accuracy`: how well the hand follows what it means, in the frame
 * and unit of the places. First and last place are kept as they are. Source: `withoutTremor`, `thinned`.
 */
export function simplifiedStroke(places: readonly Pair[], accuracy: number): Pair[] {
  const apart: Pair[] = [];
  for (const place of places) {
    const last = apart.at(-1);
    if (last === undefined || distance(last, place) >= APART * accuracy) apart.push(place);
  }
  const [first, last] = [places[0], places.at(-1)];
  if (first === undefined || last === undefined || apart.length < 2)
    return first === undefined ? [] : [first];
  const steady = [...withoutTremor(apart, accuracy)];
  steady[0] = first;
  steady[steady.length - 1] = last;
  return thinned(steady, TOLERANCE * accuracy);
}

function distance(a: Pair, b: Pair): number {
  return Math.hypot(b[0] - a[0], b[1] - a[1]);
}
