import { expect, it } from 'vitest';
import { coverageFactor } from '#shared/compute/doubt/coverage.ts';

it('has no bound without a degree of freedom', () => {
  expect(coverageFactor(0)).toBe(Number.POSITIVE_INFINITY);
});

// JCGM 100:2008, table G.2, fraction 95 %.
it.each([
  [1, 12.71],
  [2, 4.3],
  [8, 2.31],
  [20, 2.09],
  [50, 2.01],
])('for %d degrees of freedom is the tabled t', (freedom, t) => {
  expect(coverageFactor(freedom)).toBeCloseTo(t, 2);
});
