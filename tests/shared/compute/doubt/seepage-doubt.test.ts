import { expect, it } from 'vitest';
import { seepageDoubt } from '#shared/compute/doubt/seepage-doubt.ts';

const sure = { kFactor: 1, headLost: 10, headLostPlusMinus: 0, cellRatioPart: 0 };

it('says nothing while nobody has said how well k is known', () => {
  expect(seepageDoubt({ ...sure, kFactor: null })).toEqual({ factor: null, shares: [] });
});

it('is the factor of k when all else is sure', () => {
  expect(seepageDoubt({ ...sure, kFactor: 3 }).factor).toBeCloseTo(3, 12);
  expect(seepageDoubt(sure)).toEqual({ factor: 1, shares: [] });
});

// Published case 7-10 (JCGM 100:2008, equation 10): relative u of q = kHNf/Nd is 0.2574385 with u(k)/k = 0.25,
// u(H)/H = 0.05/9.5 and u(Nf/Nd)/(Nf/Nd) = √((0.2/4.2)² + (0.5/13)²). In logarithms it must agree to second order.
it('comes to the published propagation for small doubts', () => {
  const small = 0.02;
  const counts = Math.hypot(0.2 / 4.2, 0.5 / 13);
  const { factor } = seepageDoubt({
    kFactor: 1 + 0.25 * small,
    headLost: 9.5,
    headLostPlusMinus: 0.05 * small,
    cellRatioPart: counts * small,
  });
  expect((factor! - 1) / small).toBeCloseTo(0.2574385, 2);
});

it('is mostly the factor of k, and says so', () => {
  const { factor, shares } = seepageDoubt({
    kFactor: 3,
    headLost: 20,
    headLostPlusMinus: 0.5,
    cellRatioPart: 0.05,
  });
  expect(factor).toBeGreaterThan(3);
  expect(factor).toBeLessThan(3.01);
  expect(shares[0]?.source).toBe('permeability');
});
