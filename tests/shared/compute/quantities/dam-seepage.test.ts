import { describe, expect, it } from 'vitest';
import { type DamSection, damSeepage } from '#shared/compute/quantities/dam-seepage.ts';
import { METRES_PER_FOOT } from '#shared/compute/units.ts';
import { chainageIn } from '#shared/text/chainage.ts';

describe('a chainage', () => {
  it.each([
    ['212', 'SI', 212],
    [' chainage 212.5 ', 'SI', 212.5],
    ['Ch. 0', 'US', 0],
    ['2+125', 'SI', 2125],
    ['12+50.5', 'US', 1250.5],
    ['Sta. 12+50', 'US', 1250],
  ] as const)('%s (%s) is read', (text, system, value) => {
    expect(chainageIn(text, system)).toBe(value);
  });

  it.each([
    ['', 'SI'],
    ['spillway axis', 'SI'],
    ['1,250', 'SI'],
    ['12+50', 'SI'],
    ['2+125', 'US'],
    ['212 to 250', 'SI'],
  ] as const)('“%s” (%s) is not guessed', (text, system) => {
    expect(chainageIn(text, system)).toBeNull();
  });
});

describe('seepage along a dam', () => {
  const section = (id: string, chainage: string, seepage: number | null): DamSection => ({
    id,
    chainage,
    unitSystem: 'SI',
    seepage,
  });

  it('takes what it can, and names the rest with the reason (by hand)', () => {
    const found = damSeepage(
      [
        section('a', '100', 2e-5),
        section('b', '160', 4e-5),
        section('c', 'spillway', 1e-5),
        section('d', '130', null),
        section('e', '200', 3e-5),
        section('f', '0+200', 5e-5),
      ],
      'SI',
    );
    expect(found.length).toBe(60);
    expect(found.flow).toBeCloseTo(60 * 3e-5, 12);
    expect(found.leftOut.map(({ id, code }) => [id, code])).toEqual([
      ['c', 'chainageUnreadable'],
      ['d', 'noSeepage'],
      ['e', 'chainageTwice'],
      ['f', 'chainageTwice'],
    ]);
  });

  it('is the same flow for a dam in feet with nets of either system', () => {
    const feet = (metres: number) => String(metres / METRES_PER_FOOT);
    const inFeet: DamSection = {
      id: 'b',
      chainage: feet(160),
      unitSystem: 'US',
      seepage: 4e-5 / METRES_PER_FOOT ** 2,
    };
    const found = damSeepage([section('a', feet(100), 2e-5), inFeet], 'US');
    expect(found.length).toBeCloseTo(60, 9);
    expect(found.flow).toBeCloseTo(60 * 3e-5, 12);
  });

  it('has no flow from one section', () => {
    expect(damSeepage([section('a', '100', 2e-5)], 'SI')).toMatchObject({
      reaches: [],
      length: null,
      flow: null,
    });
  });
});
