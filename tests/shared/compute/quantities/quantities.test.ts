import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { seepageAlong } from '#shared/compute/quantities/average-end.ts';
import { creepLength, creepRatio } from '#shared/compute/quantities/creep.ts';
import {
  criticalGradient,
  factorAgainstBoiling,
  pressureRatio,
} from '#shared/compute/quantities/gradients.ts';
import { blowUp, heaveFactor, meanOverBase } from '#shared/compute/quantities/heave.ts';
import { FLOW_UNITS, flowIn } from '#shared/compute/quantities/seepage-volume.ts';
import { resultantOf } from '#shared/compute/quantities/uplift.ts';

const figure = fc.double({ min: -100, max: 100, noNaN: true });

describe('seepage along a dam', () => {
  it('is refused for one section, for two at one chainage, and for what is not finite', () => {
    expect(seepageAlong([])).toBeNull();
    expect(seepageAlong([{ chainage: 10, seepage: 1 }])).toBeNull();
    expect(
      seepageAlong([
        { chainage: 10, seepage: 1 },
        { chainage: 10, seepage: 2 },
      ]),
    ).toBeNull();
    expect(
      seepageAlong([
        { chainage: 10, seepage: 1 },
        { chainage: 20, seepage: Number.POSITIVE_INFINITY },
      ]),
    ).toBeNull();
  });

  it('is the mean of the two ends over each reach (by hand)', () => {
    const along = seepageAlong([
      { chainage: 250_060, seepage: 4 },
      { chainage: 250_000, seepage: 2 },
      { chainage: 250_100, seepage: 0 },
    ]);
    expect(along).toEqual({
      reaches: [
        { from: 250_000, to: 250_060, length: 60, flow: 180 },
        { from: 250_060, to: 250_100, length: 40, flow: 80 },
      ],
      length: 100,
      flow: 260,
    });
  });

  it('is the same flow in every unit, in SI and in feet', () => {
    for (const unit of FLOW_UNITS) {
      const feet = flowIn('ft³/s', 1, 'SI');
      expect(flowIn(unit, feet, 'US') / flowIn(unit, 1, 'SI')).toBeCloseTo(1, 12);
    }
  });
});

describe('factors', () => {
  const unknown = {
    saturatedUnitWeight: null,
    moistUnitWeight: null,
    specificGravity: null,
    voidRatio: null,
  };

  it('are not given without a weight, for a soil lighter than water, or where nothing drives it', () => {
    expect(criticalGradient(unknown, 9.81)).toBeNull();
    expect(criticalGradient({ ...unknown, specificGravity: 2.65 }, 9.81)).toBeNull();
    expect(criticalGradient({ ...unknown, saturatedUnitWeight: 9 }, 9.81)).toBeNull();
    expect(factorAgainstBoiling(1, 0)).toBeNull();
    expect(factorAgainstBoiling(1, -0.5)).toBeNull();
    expect(heaveFactor(10, 5, 0, 9.81)).toBeNull();
    expect(blowUp(4, 19, 100, 99, 9.81).effectiveFactor).toBeNull();
    expect(pressureRatio(10, 0)).toBeNull();
    expect(creepRatio(10, 0)).toBeNull();
  });

  it('take the entered weight before that of Gs and e', () => {
    const both = { ...unknown, saturatedUnitWeight: 19.62, specificGravity: 2.7, voidRatio: 0.85 };
    expect(criticalGradient(both, 9.81)).toBeCloseTo(1, 12);
  });

  it('are withheld as soon as one place of the base of a prism cannot be read', () => {
    expect(meanOverBase((part) => (part > 0.99 ? null : 1))).toBeNull();
    expect(meanOverBase(() => 1.5)).toBeCloseTo(1.5, 12);
    // ∫(1 − √x)dx = 1/3, the way a head leaves a tip.
    expect(meanOverBase((part) => 1 - Math.sqrt(part))).toBeCloseTo(1 / 3, 3);
  });
});

describe('the resultant of pressures', () => {
  it('of still water on a straight base is its weight to the water level, through the middle', () => {
    const still = (offset: number, elevation: number) => ({
      offset,
      elevation,
      pressure: 9.81 * (10 - elevation),
    });
    const level = resultantOf([still(3, 4), still(11, 4)]);
    expect(level.vertical).toBeCloseTo(9.81 * 6 * 8, 9);
    expect(level.arm).toBeCloseTo(4, 9);
    expect(level.actsAt![0]).toBeCloseTo(7, 9);
  });

  it('of a triangle of pressure passes through a third of the base from its greater end', () => {
    const { arm, size } = resultantOf([
      { offset: 0, elevation: 0, pressure: 60 },
      { offset: 9, elevation: 0, pressure: 0 },
    ]);
    expect(size).toBeCloseTo(270, 9);
    expect(arm).toBeCloseTo(3, 9);
  });

  it('lifts a stepped base by the weight of the water that it keeps away (Archimedes)', () => {
    const level = 12;
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 10 }), { minLength: 2, maxLength: 6 }), (depths) => {
        // Steps of one length unit, closed by upright sides to the water's level at both ends.
        const path: Pair[] = [
          [0, level],
          ...depths.flatMap((z, i): Pair[] => [
            [i, z],
            [i + 1, z],
          ]),
          [depths.length, level],
        ];
        const { vertical, horizontal } = resultantOf(
          path.map(([offset, elevation]) => ({ offset, elevation, pressure: 2 * (level - elevation) })),
        );
        const area = depths.reduce((sum, z) => sum + (level - z), 0);
        expect(vertical).toBeCloseTo(2 * area, 8);
        expect(horizontal).toBeCloseTo(0, 8);
      }),
    );
  });

  it('has no line of action where nothing presses, and none for one place', () => {
    const still = { offset: 0, elevation: 0, pressure: 0 };
    expect(resultantOf([still, { ...still, offset: 5 }])).toMatchObject({ size: 0, actsAt: null, arm: null });
    expect(resultantOf([still]).actsAt).toBeNull();
    expect(resultantOf([]).actsAt).toBeNull();
  });
});

describe('creep', () => {
  it('counts 45° as steep and anything flatter by a third (Lane 1935)', () => {
    const along = (to: Pair) => creepLength([[0, 0], to]).weighted;
    expect(along([1, -1])).toBeCloseTo(Math.SQRT2, 12);
    expect(along([1.001, -1])).toBeCloseTo(Math.hypot(1.001, 1) / 3, 12);
  });

  it('is the same followed backwards, and no longer than the whole contact', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(figure, figure), { minLength: 1, maxLength: 12 }), (contact) => {
        const there = creepLength(contact);
        const back = creepLength(contact.toReversed());
        expect(back.weighted).toBeCloseTo(there.weighted, 6);
        expect(there.weighted).toBeLessThanOrEqual(there.whole);
      }),
    );
  });
});
