import type { DoubtShares, DoubtSource } from '#shared/contract/reading-doubt.ts';

/**
 * What one independent cause adds to the error of a figure: sensitivity times the half-width that holds the cause's
 * value with 95 %, in the figure's unit and with its sign. Figures that share a cause share its name, which is how
 * their covariance is kept.
 */
export type Contribution = {
  readonly cause: string;
  readonly source: DoubtSource;
  readonly amount: number;
};

/** The contributions of all causes to one figure, each cause once. */
export type Contributions = readonly Contribution[];

/**
 * Contributions to a weighted sum of figures, Σ wᵢ·yᵢ: amounts of one cause add with their signs, which is propagation
 * with covariances. Source: JCGM 100 (2008), 5.2.2, equation 13, for causes that are independent of one another.
 */
export function weightedSum(
  terms: ReadonlyArray<readonly [weight: number, of: Contributions]>,
): Contribution[] {
  const byCause = new Map<string, Contribution>();
  for (const [weight, contributions] of terms) {
    for (const { cause, source, amount } of contributions) {
      const known = byCause.get(cause)?.amount ?? 0;
      byCause.set(cause, { cause, source, amount: known + weight * amount });
    }
  }
  return [...byCause.values()];
}

/**
 * Half-width of the interval that holds the figure with 95 %: the root of the sum of squares of the contributions, in
 * the figure's unit. Source: JCGM 100 (2008), 5.1.2 and 6.3.3, with normal distributions, so that half-widths of one
 * coverage combine as standard uncertainties do.
 */
export function halfWidth(contributions: Contributions): number {
  return Math.hypot(...contributions.map((each) => each.amount));
}

/** Part of the variance by source, greatest first; empty when there is no doubt at all. */
export function sharesOf(contributions: Contributions): DoubtShares {
  const squares = new Map<DoubtSource, number>();
  let all = 0;
  for (const { source, amount } of contributions) {
    squares.set(source, (squares.get(source) ?? 0) + amount * amount);
    all += amount * amount;
  }
  if (!(all > 0) || !Number.isFinite(all)) return [];
  return [...squares]
    .filter(([, square]) => square > 0)
    .map(([source, square]) => ({ source, part: square / all }))
    .sort((a, b) => b.part - a.part);
}
