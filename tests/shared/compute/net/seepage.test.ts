import { describe, expect, it } from 'vitest';
import { figuresOf, kPerSecondOf, seepagePerRun } from '#shared/compute/net/seepage.ts';
import {
  KILOPASCALS_PER_PSF,
  KN_PER_M3_PER_PCF,
  METRES_PER_FOOT,
  permeabilityInMetresPerSecond,
} from '#shared/compute/units.ts';
import { type EntityOf, type PermeabilityUnit, UNSAID } from '#shared/contract/document.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

function permeability(k: number | null, unit: PermeabilityUnit = 'm/s', factor: number | null = null) {
  return {
    kind: 'permeability',
    ...UNSAID.soil,
    k,
    unit,
    factor,
    source: '',
  } satisfies EntityOf<'permeability'>;
}

function relative(actual: number, expected: number): number {
  return Math.abs(actual / expected - 1);
}

describe('seepage from a counted net', () => {
  it('is that of the worked nets (published checks 8-01 Das, 8-02 Venkatramaiah, 8-06 Craig)', () => {
    expect(relative(seepagePerRun(5e-5, 5.6 - 2.2, 2.38, 6, 1), PUBLISHED['8-01'].q)).toBeLessThan(1e-6);
    expect(Math.abs(seepagePerRun(3e-4, 2.5, 4, 14, 1) - PUBLISHED['8-02'].q)).toBeLessThan(5e-8);
    expect(relative(seepagePerRun(1.5e-5, 4, 4.3, 12, 1), PUBLISHED['8-06'].q)).toBeLessThan(1e-6);
  });

  it('is the same in feet and in metres (published check 8-07, exact definitions)', () => {
    const check = PUBLISHED['8-07'];
    const us = seepagePerRun(kPerSecondOf(permeability(2.5, 'ft/day'), 'US')!, 18, 3.5, 11, 1);
    expect(relative(us * 86_400, check.q_ft3)).toBeLessThan(1e-8);
    const si = seepagePerRun(
      kPerSecondOf(permeability(2.5, 'ft/day'), 'SI')!,
      18 * METRES_PER_FOOT,
      3.5,
      11,
      1,
    );
    expect(relative(si, check.q_si)).toBeLessThan(1e-8);
  });

  it('takes the equivalent permeability of a transformed section (published check 3-04, Das)', () => {
    const k = kPerSecondOf(permeability(Math.sqrt(5.67 * 11.34), 'ft/day'), 'US')!;
    expect(Math.abs(seepagePerRun(k, 20, 2.5, 8, 1) * 86_400 - PUBLISHED['3-04'].q)).toBeLessThan(0.01);
  });

  it('grows with the width of a cell across the flow over its length along it', () => {
    expect(seepagePerRun(1e-6, 10, 4, 10, 1.5)).toBeCloseTo(1.5 * seepagePerRun(1e-6, 10, 4, 10, 1), 15);
  });
});

describe('figures that the permeability deserves', () => {
  it('are its own digits, at most three, and one when it is known within a factor of two or more', () => {
    expect(figuresOf(permeability(2e-7))).toBe(1);
    expect(figuresOf(permeability(2.5e-6))).toBe(2);
    expect(figuresOf(permeability(1.2345e-6))).toBe(3);
    expect(figuresOf(permeability(2.5e-6, 'm/s', 3))).toBe(1);
    expect(figuresOf(permeability(2.5e-6, 'm/s', 1.5))).toBe(2);
    expect(figuresOf(permeability(null))).toBe(1);
  });
});

describe('units', () => {
  it('are those of the definitions (published checks 5-10, 5-16, 5-18 to 5-21, 5-29; NIST SP 811)', () => {
    expect(relative(KILOPASCALS_PER_PSF, PUBLISHED['5-16'].kPa)).toBeLessThan(1e-8);
    expect(relative(KN_PER_M3_PER_PCF, PUBLISHED['5-18']['kN/m3'])).toBeLessThan(1e-8);
    expect(62.4 * KN_PER_M3_PER_PCF).toBeCloseTo(PUBLISHED['5-10']['62.4 lbf/ft3 in kN/m3'], 6);
    const units: ReadonlyArray<readonly [PermeabilityUnit, number]> = [
      ['cm/s', PUBLISHED['5-19']['m/s']],
      ['ft/day', PUBLISHED['5-20']['m/s']],
      ['ft/min', PUBLISHED['5-21']['m/s']],
      ['m/day', PUBLISHED['5-29']['m/s']],
    ];
    for (const [unit, expected] of units) {
      expect(relative(permeabilityInMetresPerSecond(1, unit), expected), unit).toBeLessThan(1e-8);
    }
  });
});
