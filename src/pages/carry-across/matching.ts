import {
  type MatchedPlace,
  type MatchShape,
  matchResiduals,
  matchSheets,
  type SheetMatch,
} from '#shared/compute/carry-across/match-sheets.ts';
import type { MarkedPlace } from './matching-store.ts';

/** What the places marked on both sheets say. */
export type Matching = {
  readonly pairs: readonly MatchedPlace[];
  readonly match: SheetMatch | null;
  readonly residuals: ReadonlyMap<string, number>;
  readonly sigmaPx: number | null;
};

export function matchingOf(places: readonly MarkedPlace[], shape: MatchShape): Matching {
  const both = places.filter(
    (place): place is MarkedPlace & { from: [number, number]; to: [number, number] } =>
      place.from !== null && place.to !== null,
  );
  const pairs = both.map(({ from, to }) => ({ from, to }));
  const match = matchSheets(pairs, shape);
  if (match === null) return { pairs, match, residuals: new Map(), sigmaPx: null };
  const { each, sigmaPx } = matchResiduals(match, pairs);
  return { pairs, match, residuals: new Map(both.map(({ name }, i) => [name, each[i]!])), sigmaPx };
}
