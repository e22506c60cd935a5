/** A symmetric sparse matrix by rows: `starts` (length n + 1) into `columns` and `values`; `diagonal` apart. */
export type SparseRows = {
  readonly n: number;
  readonly starts: Int32Array;
  readonly columns: Int32Array;
  readonly values: Float64Array;
  readonly diagonal: Float64Array;
};

export type SolveReport = { readonly x: Float64Array; readonly steps: number; readonly converged: boolean };

/**
 * Solves A·x = b for a symmetric positive definite A by conjugate gradients, preconditioned by the diagonal. Stops when
 * the residual has fallen to `tolerance` of that of x = `guess`' right side, or after `mostSteps`; says which. Source:
 * Hestenes and Stiefel (1952).
 */
export function conjugateGradient(
  a: SparseRows,
  b: Float64Array,
  guess: Float64Array,
  tolerance = 1e-10,
  mostSteps = 4000,
): SolveReport {
  const { n } = a;
  const x = guess.slice();
  const r = new Float64Array(n);
  const p = new Float64Array(n);
  const q = new Float64Array(n);
  const inverse = new Float64Array(n);
  multiply(a, x, q);
  let rz = 0;
  let bb = 0;
  for (let i = 0; i < n; i += 1) {
    inverse[i] = 1 / a.diagonal[i]!;
    r[i] = b[i]! - q[i]!;
    p[i] = r[i]! * inverse[i]!;
    rz += r[i]! * p[i]!;
    bb += b[i]! * b[i]! * inverse[i]!;
  }
  const enough = tolerance * tolerance * Math.max(bb, rz);
  let steps = 0;
  while (rz > enough && steps < mostSteps) {
    const pq = multiply(a, p, q);
    if (!(pq > 0)) break;
    const alpha = rz / pq;
    let next = 0;
    for (let i = 0; i < n; i += 1) {
      x[i] = x[i]! + alpha * p[i]!;
      r[i] = r[i]! - alpha * q[i]!;
      next += r[i]! * r[i]! * inverse[i]!;
    }
    const beta = next / rz;
    for (let i = 0; i < n; i += 1) p[i] = r[i]! * inverse[i]! + beta * p[i]!;
    rz = next;
    steps += 1;
  }
  return { x, steps, converged: rz <= enough };
}

/** Writes A·x into `y` and returns x·A·x. */
function multiply(
  { n, starts, columns, values, diagonal }: SparseRows,
  x: Float64Array,
  y: Float64Array,
): number {
  let dot = 0;
  let k = 0;
  for (let i = 0; i < n; i += 1) {
    let sum = diagonal[i]! * x[i]!;
    for (const end = starts[i + 1]!; k < end; k += 1) sum += values[k]! * x[columns[k]!]!;
    y[i] = sum;
    dot += sum * x[i]!;
  }
  return dot;
}
