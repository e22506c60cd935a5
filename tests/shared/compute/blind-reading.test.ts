import { describe, expect, it } from 'vitest';
import { compareBlind, headAfterDrops, pressureOf } from '#shared/compute/blind-reading.ts';
import type { PointReading } from '#shared/contract/reading.ts';

/**
 * Worked by hand (h = H − n·Δh, Casagrande 1937, Seepage through Dams): under a dam with 9 m of head in 12 drops, a point after 4 of them and
 * 2 m below the tailwater's level has lost a third of the head: h = 9 − 3 = 6 m, u = γw·(6 + 2).
 */
const FRAME = { headwater: 9, outletHead: 0, drops: 12 };

describe('the head after some of the drops', () => {
  it('falls in equal steps from the headwater to the outlet', () => {
    expect(headAfterDrops(FRAME, 0)).toBe(9);
    expect(headAfterDrops(FRAME, 4)).toBeCloseTo(6, 12);
    expect(headAfterDrops(FRAME, 12)).toBeCloseTo(0, 12);
  });

  it('is the same from any datum', () => {
    const raised = { ...FRAME, headwater: 109, outletHead: 100 };
    expect(headAfterDrops(raised, 4.5)).toBeCloseTo(headAfterDrops(FRAME, 4.5) + 100, 10);
  });
});

describe('the pressure', () => {
  it('is γw times the head above the point, and nothing above the water', () => {
    expect(pressureOf(6, -2, 9.81)).toBeCloseTo(78.48, 10);
    expect(pressureOf(6, 6, 9.81)).toBe(0);
    expect(pressureOf(6, 7, 9.81)).toBe(0);
  });
});

describe('a blind reading beside the engineer’s', () => {
  const own = {
    pointId: 'p',
    name: 'P1',
    sheetAt: null,
    offset: null,
    elevation: -2,
    dropsLost: 4,
    totalHead: 6,
    porePressure: 78.48,
    remark: '',
  };
  const net = (change: Partial<PointReading>) =>
    [{ id: 'p', elevation: -2, totalHead: 6.1, totalHeadPlusMinus: 0.2, ...change }] as PointReading[];

  it('has differences, own minus net, and says whether they lie within the ±', () => {
    const [row] = compareBlind([own], net({ porePressure: 79.5, porePressurePlusMinus: 1 }));
    expect(row?.totalHead.difference).toBeCloseTo(-0.1, 12);
    expect(row?.totalHead.within).toBe(true);
    expect(row?.porePressure.difference).toBeCloseTo(-1.02, 10);
    expect(row?.porePressure.within).toBe(false);
    expect(row?.offset.difference).toBeNull();
  });

  it('says nothing where the engineer has no figure, or no ±', () => {
    const [none] = compareBlind([own], []);
    expect(none?.porePressure).toEqual({
      own: 78.48,
      net: null,
      difference: null,
      plusMinus: null,
      within: null,
    });
    const bare = net({ porePressure: 80, porePressurePlusMinus: null });
    expect(compareBlind([own], bare)[0]?.porePressure.within).toBeNull();
  });

  it('agrees with a pressure of 0 above the phreatic line only by 0', () => {
    const dry = net({ porePressure: 0, porePressurePlusMinus: null });
    expect(compareBlind([{ ...own, porePressure: 0 }], dry)[0]?.porePressure.within).toBe(true);
    expect(compareBlind([own], dry)[0]?.porePressure.within).toBeNull();
  });
});
