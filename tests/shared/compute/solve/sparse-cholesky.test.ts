import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';
import { nestedDissection } from '#shared/compute/solve/nested-dissection.ts';
import { choleskyOf } from '#shared/compute/solve/sparse-cholesky.ts';

/** The five-point matrix of a grid, with `shift` added to its diagonal, and the places of its unknowns. */
function gridMatrix(columns: number, rows: number, shift: number) {
  const n = columns * rows;
  const starts = [0];
  const neighbours: number[] = [];
  for (let i = 0; i < n; i += 1) {
    const [c, r] = [i % columns, Math.floor(i / columns)];
    if (r > 0) neighbours.push(i - columns);
    if (c > 0) neighbours.push(i - 1);
    if (c + 1 < columns) neighbours.push(i + 1);
    if (r + 1 < rows) neighbours.push(i + columns);
    starts.push(neighbours.length);
  }
  const matrix: SparseRows = {
    n,
    starts: Int32Array.from(starts),
    columns: Int32Array.from(neighbours),
    values: new Float64Array(neighbours.length).fill(-1),
    diagonal: Float64Array.from({ length: n }, (_, i) => starts[i + 1]! - starts[i]! + shift),
  };
  const x = Float64Array.from({ length: n }, (_, i) => i % columns);
  const y = Float64Array.from({ length: n }, (_, i) => Math.floor(i / columns));
  return { matrix, x, y };
}

function times(a: SparseRows, x: Float64Array): Float64Array {
  return x.map((value, i) => {
    let sum = a.diagonal[i]! * value;
    for (let k = a.starts[i]!; k < a.starts[i + 1]!; k += 1) sum += a.values[k]! * x[a.columns[k]!]!;
    return sum;
  });
}

describe('nested dissection and the sparse Cholesky factor', () => {
  it('take every unknown once and give back what was multiplied', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 30 }),
        fc.integer({ min: 1, max: 30 }),
        fc.double({ min: 0.01, max: 2, noNaN: true }),
        (columns, rows, shift) => {
          const { matrix, x, y } = gridMatrix(columns, rows, shift);
          const order = nestedDissection(matrix, x, y);
          expect([...order].sort((a, b) => a - b)).toEqual([...x.keys()]);
          const wanted = x.map((_, i) => Math.sin(3 * i) * 10);
          const found = choleskyOf(matrix, order)!.solve(times(matrix, wanted));
          found.forEach((value, i) => {
            expect(Math.abs(value - wanted[i]!)).toBeLessThan(1e-8);
          });
        },
      ),
      { numRuns: 40 },
    );
  });

  it('refuse a matrix that is not positive definite', () => {
    for (const shift of [0, -0.1]) {
      const { matrix, x, y } = gridMatrix(12, 9, shift);
      expect(choleskyOf(matrix, nestedDissection(matrix, x, y))).toBeNull();
    }
  });

  it('keep the factor of a grid sparse: below 31/4·n·log₂n (George 1973)', () => {
    const { matrix, x, y } = gridMatrix(100, 100, 0.1);
    const natural = Int32Array.from(x.keys());
    const dissected = choleskyOf(matrix, nestedDissection(matrix, x, y))!.entries;
    expect(dissected).toBeLessThan((31 / 4) * 10_000 * Math.log2(10_000));
    expect(dissected).toBeLessThan(choleskyOf(matrix, natural)!.entries / 2);
  });

  it('order places that all lie on one another', () => {
    const { matrix, x, y } = gridMatrix(20, 20, 0.1);
    const order = nestedDissection(matrix, x.fill(0), y.fill(0));
    expect(new Set(order).size).toBe(400);
  });
});
