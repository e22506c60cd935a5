import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { conjugateGradient, type SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';

/** The second-difference matrix with 2 + shift on its diagonal and −1 beside it. */
function chainMatrix(n: number, shift: number): SparseRows {
  const starts = [0];
  const columns: number[] = [];
  for (let i = 0; i < n; i += 1) {
    if (i > 0) columns.push(i - 1);
    if (i < n - 1) columns.push(i + 1);
    starts.push(columns.length);
  }
  return {
    n,
    starts: Int32Array.from(starts),
    columns: Int32Array.from(columns),
    values: new Float64Array(columns.length).fill(-1),
    diagonal: new Float64Array(n).fill(2 + shift),
  };
}

describe('conjugate gradients', () => {
  it('solve a chain between two held ends: the straight line between them', () => {
    const n = 60;
    const right = new Float64Array(n);
    right[0] = 10;
    right[n - 1] = 4;
    const { x, converged, steps } = conjugateGradient(chainMatrix(n, 0), right, new Float64Array(n), 1e-12);
    expect(converged).toBe(true);
    expect(steps).toBeLessThanOrEqual(n + 2);
    x.forEach((value, i) => {
      expect(value).toBeCloseTo(10 - (6 * (i + 1)) / (n + 1), 8);
    });
  });

  it('say when they have not come to rest', () => {
    const right = new Float64Array(200).fill(1);
    expect(conjugateGradient(chainMatrix(200, 0), right, new Float64Array(200), 1e-12, 3).converged).toBe(
      false,
    );
  });

  it('give back what was multiplied', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 2, maxLength: 30 }), (wanted) => {
        const a = chainMatrix(wanted.length, 0.3);
        const right = Float64Array.from(
          wanted,
          (value, i) => 2.3 * value - (wanted[i - 1] ?? 0) - (wanted[i + 1] ?? 0),
        );
        const { x } = conjugateGradient(a, right, new Float64Array(wanted.length), 1e-13);
        wanted.forEach((value, i) => {
          expect(x[i]).toBeCloseTo(value, 6);
        });
      }),
    );
  });
});
