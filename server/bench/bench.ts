/** One measured value beside its reference, which was measured in the same run on the same machine. */
export interface BenchRow {
  name: string;
  value: number;
  unit: string;
  /** null where the product promises a value of its own rather than one beside another program's. */
  reference: number | null;
  ratio: number | null;
  /** Runs that the median was taken of. */
  samples: number;
}

export interface Bench {
  name: string;
  /** What is measured against what, for the table. */
  about: string;
  run(): Promise<BenchRow[]>;
}

/** Middle value; of an even count the mean of the two in the middle. @throws RangeError without values */
export function median(values: readonly number[]): number {
  return percentile(values, 0.5);
}

/** Value at `share` (0 to 1) of the sorted values, linear between neighbours. @throws RangeError without values */
export function percentile(values: readonly number[], share: number): number {
  if (values.length === 0) throw new RangeError('No values were measured.');
  const sorted = [...values].sort((a, b) => a - b);
  const at = (sorted.length - 1) * share;
  const [low = 0, high = 0] = [sorted[Math.floor(at)], sorted[Math.ceil(at)]];
  return low + (high - low) * (at - Math.floor(at));
}

/** A row from the samples of both sides; the median of each. */
export function rowOf(
  name: string,
  unit: string,
  values: readonly number[],
  references: readonly number[] | null,
): BenchRow {
  const value = median(values);
  const reference = references ? median(references) : null;
  return {
    name,
    value,
    unit,
    reference,
    ratio: reference === null ? null : value / reference,
    samples: values.length,
  };
}

/** Runs `measure` several times after one run that is thrown away, since the first one also warms caches. */
export async function repeated(times: number, measure: () => Promise<number>): Promise<number[]> {
  await measure();
  const values: number[] = [];
  for (let run = 0; run < times; run++) values.push(await measure());
  return values;
}
