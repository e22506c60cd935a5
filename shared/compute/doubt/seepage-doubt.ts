import { type Contribution, halfWidth, sharesOf } from '#shared/compute/doubt/contributions.ts';

import type { DoubtShares } from '#shared/contract/reading-doubt.ts';

/** What the seepage hangs on besides the counts; half-widths at 95 %. */
export type SeepageDoubtInputs = {
  /** Factor (×/÷) within which k is known; null while nobody has said it. */
  readonly kFactor: number | null;
  readonly headLost: number;
  /** Half-width of the head lost, length unit. */
  readonly headLostPlusMinus: number;
  /** Half-width of the mean cell ratio B/L as a part of it, from the accuracy of tracing. */
  readonly cellRatioPart: number;
};

/** Seepage is known within ×/÷ `factor`; null while k has no factor. `shares` are parts of the variance of ln q. */
export type SeepageDoubt = { readonly factor: number | null; readonly shares: DoubtShares };

/**
 * The factor within which q = k·H·Nf/Nd·(B/L) is known at 95 %, propagated in logarithms: ln f = √(ln²f(k) + ln²(1 +
 * U(H)/H) + ln²(1 + U(B/L)/(B/L))). Permeability is spread log-normally, so that k carries a factor and no ±. Source:
 * JCGM 100 (2008), 5.1.6, in logarithms. Null without k's factor: a q without it has no known bounds.
 */
export function seepageDoubt(inputs: SeepageDoubtInputs): SeepageDoubt {
  const contributions: Contribution[] = [
    {
      cause: 'head lost',
      source: 'waterLevels',
      amount: relative(inputs.headLostPlusMinus, inputs.headLost),
    },
    { cause: 'cells', source: 'tracing', amount: Math.log1p(inputs.cellRatioPart) },
  ];
  if (inputs.kFactor === null) return { factor: null, shares: [] };
  const all: Contribution[] = [
    { cause: 'k', source: 'permeability', amount: Math.log(inputs.kFactor) },
    ...contributions,
  ];
  const factor = Math.exp(halfWidth(all));
  return Number.isFinite(factor) ? { factor, shares: sharesOf(all) } : { factor: null, shares: [] };
}

function relative(halfWide: number, value: number): number {
  return value > 0 ? Math.log1p(halfWide / value) : 0;
}
