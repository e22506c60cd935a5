import { expect, it } from 'vitest';
import { gradientPlusMinus } from '#shared/compute/doubt/gradient-doubt.ts';

// JCGM 100:2008, equation 12, for a quotient: (u(i)/i)² = (u(Δh)/Δh)² + (u(ℓ)/ℓ)², the length having two ends.
it('of a quotient adds relative doubts by their squares', () => {
  const plusMinus = gradientPlusMinus({
    headDifference: 0.5,
    headDoubt: [{ cause: 'headwater', source: 'waterLevels', amount: 0.04 }],
    length: 2,
    tracing: 0.1,
  });
  const relative = Math.hypot(0.04 / 0.5, (0.1 * Math.SQRT2) / 2);
  expect(plusMinus).toBeCloseTo(0.25 * relative, 12);
});

it('is nothing when all is sure', () => {
  expect(gradientPlusMinus({ headDifference: 0.5, headDoubt: [], length: 2, tracing: 0 })).toBe(0);
});
