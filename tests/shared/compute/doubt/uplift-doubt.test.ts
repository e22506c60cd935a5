import { describe, expect, it } from 'vitest';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import { changed, withAdded } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';

const WIDTH = 20;
const GAMMA_W = 9.81;
const net = flatApronNet({
  width: WIDTH,
  headwater: 106,
  tailwater: 100,
  drops: 12,
  channels: 7,
  middle: [0, 98],
});
const base: EntityOf<'profile'> = {
  kind: 'profile',
  name: 'Floor',
  use: 'base',
  place: {
    on: 'section',
    points: [
      [-WIDTH / 2, 98],
      [WIDTH / 2, 98],
    ],
  },
  spacing: 0.5,
  finished: true,
  order: 0,
};

function upliftWith(said: Partial<EntityOf<'waterLevels'>>) {
  const traced = exactNetDocument(net, { pxPerUnit: 55, gammaW: GAMMA_W });
  const sure = changed(traced, 'netCount', (count) => ({
    ...count,
    tracingAccuracyPx: 0.001,
    knownPointAccuracyPx: 0,
  }));
  const document = withAdded(
    changed(sure, 'waterLevels', (water) => ({ ...water, ...said })),
    base,
  );
  return readNet(document).profiles[0]!.uplift!;
}

// Under a flat floor the mean head is half-way between the waters (h = (H/π)·arccos(2x/b), Pavlovsky 1922, Harr 1962), so
// that a level that is off by U moves the resultant by γw·b·U/2.
describe('the ± of an uplift resultant', () => {
  it('follows the headwater by half', () => {
    const { total, excess } = upliftWith({ headwaterPlusMinus: 0.3 });
    expect(total!.plusMinus).toBeCloseTo(GAMMA_W * WIDTH * 0.15, 0);
    expect(excess!.plusMinus).toBeCloseTo(GAMMA_W * WIDTH * 0.15, 0);
  });

  it('follows the tailwater by half, and so does the excess, the other way round', () => {
    const { total, excess } = upliftWith({ tailwaterPlusMinus: 0.3 });
    expect(total!.plusMinus).toBeCloseTo(GAMMA_W * WIDTH * 0.15, 0);
    expect(excess!.plusMinus).toBeCloseTo(GAMMA_W * WIDTH * 0.15, 0);
  });

  it('takes nothing from an error of the datum, which levels and base share', () => {
    const { total, excess } = upliftWith({ datumPlusMinus: 5 });
    expect(total!.plusMinus).toBeLessThan(0.2);
    expect(excess!.plusMinus).toBeLessThan(0.2);
  });
});
