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
  const ap = multiply(a, x);
  let rz = 0;
  let bb = 0;
  for (let i = 0; i < n; i += 1) {
    r[i] = b[i]! - ap[i]!;
    p[i] = r[i]! / a.diagonal[i]!;
    rz += r[i]! * p[i]!;
    bb += (b[i]! * b[i]!) / a.diagonal[i]!;
  }
  const enough = tolerance * tolerance * Math.max(bb, rz);
  let steps = 0;
  while (rz > enough && steps < mostSteps) {
    const q = multiply(a, p);
    let pq = 0;
    for (let i = 0; i < n; i += 1) pq += p[i]! * q[i]!;
    if (!(pq > 0)) break;
    const alpha = rz / pq;
    let next = 0;
    for (let i = 0; i < n; i += 1) {
      x[i] = x[i]! + alpha * p[i]!;
      r[i] = r[i]! - alpha * q[i]!;
      next += (r[i]! * r[i]!) / a.diagonal[i]!;
    }
    const beta = next / rz;
    for (let i = 0; i < n; i += 1) p[i] = r[i]! / a.diagonal[i]! + beta * p[i]!;
    rz = next;
    steps += 1;
  }
  return { x, steps, converged: rz <= enough };
}

function multiply(a: SparseRows, x: Float64Array): Float64Array {
  const y = new Float64Array(a.n);
  for (let i = 0; i < a.n; i += 1) {
    let sum = a.diagonal[i]! * x[i]!;
    for (let k = a.starts[i]!; k < a.starts[i + 1]!; k += 1) sum += a.values[k]! * x[a.columns[k]!]!;
    y[i] = sum;
  }
  return y;
}
