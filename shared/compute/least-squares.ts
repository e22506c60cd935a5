/** A column that keeps less than this part of its length after the others are taken off says nothing of its own. */
const DEPENDENT_PART = 1e-9;

/**
 * The x by which Σ(rows·x − values)² is least, by Householder's reflections (Golub and Van Loan, Matrix Computations,
 * 5.3). `rows`: one for each equation, all as long as there are unknowns; columns of like size lose no figures. Null when
 * there are fewer equations than unknowns, or when these do not determine them.
 */
export function leastSquares(
  rows: readonly (readonly number[])[],
  values: readonly number[],
): number[] | null {
  const unknowns = rows[0]?.length ?? 0;
  if (unknowns === 0 || rows.length < unknowns) return null;
  const a = rows.map((row, i) => [...row, values[i]!]);
  for (let column = 0; column < unknowns; column += 1) if (!reflected(a, column)) return null;
  const x = new Array<number>(unknowns).fill(0);
  for (let i = unknowns - 1; i >= 0; i -= 1) {
    let rest = a[i]![unknowns]!;
    for (let j = i + 1; j < unknowns; j += 1) rest -= a[i]![j]! * x[j]!;
    x[i] = rest / a[i]![i]!;
  }
  return x.every(Number.isFinite) ? x : null;
}

/** Clears a column below its diagonal, the right side taken along; false when nothing of it is left. */
function reflected(a: number[][], column: number): boolean {
  const whole = Math.hypot(...a.map((row) => row[column]!));
  const below = a.slice(column).map((row) => row[column]!);
  const length = Math.hypot(...below);
  if (!(length > DEPENDENT_PART * whole)) return false;
  const first = below[0]! > 0 ? below[0]! + length : below[0]! - length;
  const v = [first, ...below.slice(1)];
  const square = v.reduce((sum, each) => sum + each * each, 0);
  for (let j = column; j < a[0]!.length; j += 1) {
    const dot = v.reduce((sum, each, i) => sum + each * a[column + i]![j]!, 0);
    const by = (2 * dot) / square;
    for (let i = 0; i < v.length; i += 1) a[column + i]![j]! -= by * v[i]!;
  }
  return true;
}
