import { describe, expect, it } from 'vitest';
import { type Contribution, halfWidth, sharesOf, weightedSum } from '#shared/compute/doubt/contributions.ts';

const one = (cause: string, amount: number): Contribution[] => [{ cause, source: 'tracing', amount }];

describe('contributions to the doubt of a figure', () => {
  it('add to nothing where there is no cause', () => {
    expect(halfWidth([])).toBe(0);
    expect(sharesOf([])).toEqual([]);
    expect(sharesOf(one('a', 0))).toEqual([]);
  });

  // Published case 7-08, after JCGM 100:2008 equation 10: u = γw(h − z), independent inputs.
  it('of independent inputs add by their squares', () => {
    const pressure = weightedSum([
      [9.789, one('h', 0.1)],
      [-9.789, one('z', 0.05)],
      [23.4 - 12.15, one('gamma', 0.005)],
    ]);
    expect(halfWidth(pressure)).toBeCloseTo(1.095888, 6);
  });

  // Published case 7-09, JCGM 100:2008 equation 13: the same with correlation 0.8 of h and z, one datum error in both.
  it('of inputs that share a cause keep its sign', () => {
    const r = 0.8;
    const h = one('datum', 0.1);
    const z = weightedSum([
      [r, one('datum', 0.05)],
      [Math.sqrt(1 - r * r), one('own', 0.05)],
    ]);
    const pressure = weightedSum([
      [9.789, h],
      [-9.789, z],
      [23.4 - 12.15, one('gamma', 0.005)],
    ]);
    expect(halfWidth(pressure)).toBeCloseTo(0.6590709, 6);
  });

  // Published case 7-11: JCGM 100:2008, H.2, three correlated inputs, with the correlations made by shared causes.
  it('give the impedance of the published example its uncertainties', () => {
    const [v, i, phi] = [4.999, 0.019661, 1.04446];
    const correlated = sharedCauses([0.0032, 9.5e-6, 0.00075], [-0.36, 0.86, -0.65]);
    const [dv, di, dphi] = correlated as [Contribution[], Contribution[], Contribution[]];
    const resistance = weightedSum([
      [Math.cos(phi) / i, dv],
      [(-v * Math.cos(phi)) / i ** 2, di],
      [(-v * Math.sin(phi)) / i, dphi],
    ]);
    const reactance = weightedSum([
      [Math.sin(phi) / i, dv],
      [(-v * Math.sin(phi)) / i ** 2, di],
      [(v * Math.cos(phi)) / i, dphi],
    ]);
    expect(halfWidth(resistance)).toBeCloseTo(0.06997873, 6);
    expect(halfWidth(reactance)).toBeCloseTo(0.2957168, 6);
  });

  it('are told by source, the greatest first', () => {
    const shares = sharesOf([
      { cause: 'a', source: 'tracing', amount: 3 },
      { cause: 'b', source: 'waterLevels', amount: -4 },
    ]);
    expect(shares).toEqual([
      { source: 'waterLevels', part: 16 / 25 },
      { source: 'tracing', part: 9 / 25 },
    ]);
  });
});

/** Three figures with given deviations and correlations r12, r13, r23, out of three independent causes (Cholesky). */
function sharedCauses(deviations: readonly number[], [r12, r13, r23]: readonly number[]): Contribution[][] {
  const l22 = Math.sqrt(1 - r12! ** 2);
  const l32 = (r23! - r12! * r13!) / l22;
  const l33 = Math.sqrt(1 - r13! ** 2 - l32 ** 2);
  return [
    weightedSum([[deviations[0]!, one('1', 1)]]),
    weightedSum([
      [deviations[1]! * r12!, one('1', 1)],
      [deviations[1]! * l22, one('2', 1)],
    ]),
    weightedSum([
      [deviations[2]! * r13!, one('1', 1)],
      [deviations[2]! * l32, one('2', 1)],
      [deviations[2]! * l33, one('3', 1)],
    ]),
  ];
}
