import { expect, it } from 'vitest';
import { MOST_PLACES, shownGroups } from '#client/pages/check/shown-groups.ts';
import type { FigureGroup, GroupKind } from '#shared/compute/compare-figures/figure-types.ts';
import { figuresBeside, type GroupBeside } from '#shared/compute/compare-figures/figures-beside.ts';

/** A place of a profile, or a point, with a pressure of its own in both readings. */
function group(kind: GroupKind, id: string, frozen: number, now: number): GroupBeside {
  const of = (value: number): FigureGroup => ({
    kind,
    id,
    name: id,
    status: 'read',
    reason: '',
    figures: [{ what: 'porePressure', quantity: 'pressure', value, plusMinus: null, digits: null }],
  });
  return figuresBeside([of(frozen)], [of(now)], { unitSystem: 'SI', sameDatum: true })[0]!;
}

const places = (count: number, now: number) =>
  Array.from({ length: count }, (_, i) => group('sample', `place ${i} ${now}`, 60, now));

it('lists every point, and of the places along profiles those that differ', () => {
  const all = [group('point', 'P1', 60, 60), ...places(3, 61), ...places(400, 60)];
  const shown = shownGroups(all, false);
  expect(shown.groups.map(({ kind }) => kind)).toEqual(['point', 'sample', 'sample', 'sample']);
  expect(shown).toMatchObject({ equalPlaces: 400, morePlaces: 0 });
});

it('lists no more places than one can look through, and says how many are left', () => {
  const shown = shownGroups(places(MOST_PLACES + 7, 61), false);
  expect(shown.groups).toHaveLength(MOST_PLACES);
  expect(shown).toMatchObject({ equalPlaces: 0, morePlaces: 7 });
});

it('leaves out on request whatever is equal', () => {
  const all = [group('point', 'P1', 60, 60), group('point', 'P2', 60, 62)];
  expect(shownGroups(all, true).groups.map(({ name }) => name)).toEqual(['P2']);
});
