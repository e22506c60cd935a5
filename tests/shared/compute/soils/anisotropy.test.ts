import { describe, expect, it } from 'vitest';
import { kPerSecondOf, seepagePerRun } from '#shared/compute/net/seepage.ts';
import { commonAnisotropy } from '#shared/compute/soils/anisotropy.ts';
import { type EntityOf, type PermeabilityUnit, UNSAID } from '#shared/contract/document.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

const soil = (k: number | null, kv: number | null, dipDeg = 0, unit: PermeabilityUnit = 'm/s') =>
  ({
    kind: 'permeability',
    ...UNSAID.soil,
    k,
    kv,
    dipDeg,
    unit,
    factor: null,
    source: '',
  }) satisfies EntityOf<'permeability'>;

describe('an anisotropic soil', () => {
  it.each([
    ['3-01', 9e-6],
    ['3-02', 4e-6],
    ['3-03', 9e-6],
  ] as const)('is transformed and seeps as published (check %s, Harr 1962)', (id, kx) => {
    const check = PUBLISHED[id];
    const { kind, ratio } = commonAnisotropy([soil(kx, 1e-6)], null);
    expect(kind).toBe('transformed');
    expect(Math.sqrt(1 / ratio)).toBeCloseTo(check.x_factor, 9);
    const k = kPerSecondOf(soil(kx, 1e-6), 'SI')!;
    expect(k / check.k_equivalent).toBeCloseTo(1, 9);
    expect(seepagePerRun(k, 5, check.shape_factor, 1, 1) / check.q).toBeCloseTo(1, 6);
  });

  it('seeps as the printed example in feet and days (check 3-04, Das)', () => {
    const k = kPerSecondOf(soil(11.34, 5.67, 0, 'ft/day'), 'US')!;
    expect(Math.abs(seepagePerRun(k, 20, 2.5, 8, 1) * 86_400 - PUBLISHED['3-04'].q)).toBeLessThan(0.01);
  });
});

describe('several soils', () => {
  it('share a transformed section when kh/kv and dip are one, and none otherwise', () => {
    expect(commonAnisotropy([soil(9e-6, 1e-6), soil(9e-8, 1e-8)], null)).toMatchObject({
      kind: 'transformed',
    });
    expect(commonAnisotropy([soil(9e-6, 1e-6, 12), soil(9e-8, 1e-8, -3)], null).kind).toBe('none');
    expect(commonAnisotropy([soil(9e-6, 1e-6), soil(4e-6, 1e-6)], null).kind).toBe('none');
    expect(commonAnisotropy([soil(9e-6, 1e-6), soil(4e-6, null)], null).kind).toBe('none');
    expect(commonAnisotropy([soil(2e-6, 2e-6, 30), soil(1e-9, null)], null).kind).toBe('natural');
    expect(commonAnisotropy([], null).kind).toBe('natural');
  });

  it('are as the drawing was transformed, whatever is typed', () => {
    expect(commonAnisotropy([soil(4e-6, 1e-6)], 9)).toEqual({ kind: 'transformed', ratio: 9, dipDeg: 0 });
    expect(commonAnisotropy([soil(4e-6, null)], 1e9).kind).toBe('none');
  });
});
