import { expect, it } from 'vitest';
import { differenceText, givenRuns } from '#client/features/desk/components/figure-beside.ts';
import { figureLabel } from '#client/features/desk/components/figure-unit.ts';
import type { Quantity } from '#shared/compute/compare-figures/figure-types.ts';
import { type FigureBeside, figuresBeside } from '#shared/compute/compare-figures/figures-beside.ts';

/** Two figures of one quantity as the comparison gives them. */
function beside(quantity: Quantity, one: number | null, other: number | null, digits = 2): FigureBeside {
  const group = (value: number | null) => ({
    kind: 'net' as const,
    id: 'net',
    name: '',
    status: 'read' as const,
    reason: '',
    figures: [{ what: 'seepage' as const, quantity, value, plusMinus: null, digits }],
  });
  const options = { unitSystem: 'SI', sameDatum: true } as const;
  return figuresBeside([group(one)], [group(other)], options)[0]!.figures[0]!;
}
const difference = (figure: FigureBeside) => differenceText(figure, 'SI');

it('a difference of levels and pressures has its sign and their decimals', () => {
  expect(difference(beside('totalHead', 112.5, 110.25))).toBe('−2.25');
  expect(difference(beside('pressure', 60, 85.26))).toBe('+25.3');
  expect(difference(beside('count', 10, 12))).toBe('+2');
  expect(difference(beside('count', 10, null))).toBe('–');
});

it('a seepage is told by the part it differs by, or how many times as much it is', () => {
  expect(difference(beside('seepage', 2e-6, 1.5e-6))).toBe('−25.0 %');
  expect(difference(beside('seepage', 2e-6, 3e-6))).toBe('+50.0 %');
  expect(difference(beside('permeability', 2e-7, 4e-5))).toBe('× 200');
  expect(difference(beside('seepage', 0, 1e-6))).toBe('–');
});

it('a figure is written as its quantity is, with its ±', () => {
  const figure = beside('seepage', 1.5e-6, null);
  expect(givenRuns({ value: 1.5e-6, plusMinus: null }, figure, 'SI')).toEqual(['1.5 × 10', { sup: '−6' }]);
  expect(givenRuns({ value: 12.345, plusMinus: 0.04 }, beside('length', 1, 1), 'SI').join('')).toBe(
    '12.35 ± 0.04',
  );
  expect(givenRuns({ value: null, plusMinus: null }, figure, 'SI')).toEqual(['–']);
});

it('a figure is named with its unit, levels with their datum', () => {
  const units = { unitSystem: 'US', datum: 'LD' } as const;
  expect(figureLabel('totalHead', 'totalHead', units)).toBe('Total head, ft LD');
  expect(figureLabel('porePressure', 'pressure', units)).toBe('Pore pressure, lb/ft²');
  expect(figureLabel('drops', 'count', units)).toBe('Drops Nd');
});
