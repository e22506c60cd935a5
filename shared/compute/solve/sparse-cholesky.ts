import type { SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';

/** A factor L of a matrix in the given order; `entries`: numbers kept below its diagonal. */
export type CholeskyFactor = {
  readonly entries: number;
  /** x with A·x = b, both in the matrix's own order, length n. */
  readonly solve: (b: Float64Array) => Float64Array;
};

/**
 * Factorises a symmetric positive definite matrix, A = L·Lᵀ, its unknowns taken in `order` (each once). Null when it is
 * not positive definite, that is when a pivot falls to a 10⁻¹³th of its diagonal or below. Row by row along the
 * elimination tree; source: Davis (2006), Direct Methods for Sparse Linear Systems, ch. 4.
 */
export function choleskyOf(a: SparseRows, order: Int32Array): CholeskyFactor | null {
  const place = new Int32Array(a.n);
  order.forEach((i, k) => {
    place[i] = k;
  });
  const upper = upperOf(a, order, place);
  const parent = eliminationTree(upper);
  const starts = columnStarts(upper, parent);
  const factor = factorise(upper, parent, starts);
  if (factor === null) return null;
  return { entries: starts[a.n]!, solve: (b) => solve(factor, order, b) };
}

/** For each k in the new order the columns before it, with values, and the diagonal. */
type Upper = {
  readonly n: number;
  readonly starts: Int32Array;
  readonly columns: Int32Array;
  readonly values: Float64Array;
  readonly diagonal: Float64Array;
};

type Factor = {
  readonly starts: Int32Array;
  readonly rows: Int32Array;
  readonly values: Float64Array;
  readonly diagonal: Float64Array;
};

function upperOf(a: SparseRows, order: Int32Array, place: Int32Array): Upper {
  const starts = new Int32Array(a.n + 1);
  const columns = new Int32Array(a.columns.length);
  const values = new Float64Array(a.columns.length);
  let end = 0;
  for (let k = 0; k < a.n; k += 1) {
    const i = order[k]!;
    for (let e = a.starts[i]!; e < a.starts[i + 1]!; e += 1) {
      const j = place[a.columns[e]!]!;
      if (j >= k) continue;
      columns[end] = j;
      values[end] = a.values[e]!;
      end += 1;
    }
    starts[k + 1] = end;
  }
  return { n: a.n, starts, columns, values, diagonal: Float64Array.from(order, (i) => a.diagonal[i]!) };
}

/** Parent of each unknown in the elimination tree; −1 for roots (Liu 1990). */
function eliminationTree({ n, starts, columns }: Upper): Int32Array {
  const parent = new Int32Array(n).fill(-1);
  const ancestor = new Int32Array(n).fill(-1);
  for (let k = 0; k < n; k += 1) {
    for (let e = starts[k]!; e < starts[k + 1]!; e += 1) {
      let i = columns[e]!;
      while (i !== -1 && i < k) {
        const next = ancestor[i]!;
        ancestor[i] = k;
        if (next === -1) parent[i] = k;
        i = next;
      }
    }
  }
  return parent;
}

/** Where the columns of L begin, from counting the pattern of every row. */
function columnStarts({ n, starts, columns }: Upper, parent: Int32Array): Int32Array {
  const counts = new Int32Array(n + 1);
  const seen = new Int32Array(n).fill(-1);
  for (let k = 0; k < n; k += 1) {
    seen[k] = k;
    for (let e = starts[k]!; e < starts[k + 1]!; e += 1) {
      for (let i = columns[e]!; seen[i] !== k; i = parent[i]!) {
        seen[i] = k;
        counts[i + 1] = counts[i + 1]! + 1;
      }
    }
  }
  for (let k = 0; k < n; k += 1) counts[k + 1] = counts[k + 1]! + counts[k]!;
  return counts;
}

function factorise(upper: Upper, parent: Int32Array, starts: Int32Array): Factor | null {
  const { n } = upper;
  const rows = new Int32Array(starts[n]!);
  const values = new Float64Array(starts[n]!);
  const diagonal = new Float64Array(n);
  const end = starts.slice(0, n);
  const work = new Float64Array(n);
  const seen = new Int32Array(n).fill(-1);
  const pattern = new Int32Array(n);
  const path = new Int32Array(n);
  for (let k = 0; k < n; k += 1) {
    let top = n;
    seen[k] = k;
    for (let e = upper.starts[k]!; e < upper.starts[k + 1]!; e += 1) {
      const j = upper.columns[e]!;
      work[j] = upper.values[e]!;
      let length = 0;
      for (let i = j; seen[i] !== k; i = parent[i]!) {
        path[length] = i;
        length += 1;
        seen[i] = k;
      }
      while (length > 0) {
        length -= 1;
        top -= 1;
        pattern[top] = path[length]!;
      }
    }
    let pivot = upper.diagonal[k]!;
    for (; top < n; top += 1) {
      const i = pattern[top]!;
      const entry = work[i]! / diagonal[i]!;
      work[i] = 0;
      const stop = end[i]!;
      for (let p = starts[i]!; p < stop; p += 1) work[rows[p]!] = work[rows[p]!]! - values[p]! * entry;
      pivot -= entry * entry;
      rows[stop] = k;
      values[stop] = entry;
      end[i] = stop + 1;
    }
    if (!(pivot > 1e-13 * upper.diagonal[k]!)) return null;
    diagonal[k] = Math.sqrt(pivot);
  }
  return { starts, rows, values, diagonal };
}

function solve({ starts, rows, values, diagonal }: Factor, order: Int32Array, b: Float64Array): Float64Array {
  const n = diagonal.length;
  const x = Float64Array.from(order, (i) => b[i]!);
  for (let k = 0; k < n; k += 1) {
    const xk = x[k]! / diagonal[k]!;
    x[k] = xk;
    for (let p = starts[k]!; p < starts[k + 1]!; p += 1) x[rows[p]!] = x[rows[p]!]! - values[p]! * xk;
  }
  for (let k = n - 1; k >= 0; k -= 1) {
    let sum = x[k]!;
    for (let p = starts[k]!; p < starts[k + 1]!; p += 1) sum -= values[p]! * x[rows[p]!]!;
    x[k] = sum / diagonal[k]!;
  }
  const result = new Float64Array(n);
  order.forEach((i, k) => {
    result[i] = x[k]!;
  });
  return result;
}
