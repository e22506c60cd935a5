import {
  type Contribution,
  type Contributions,
  halfWidth,
  weightedSum,
} from '#shared/compute/doubt/contributions.ts';

/** A gradient Δh/ℓ read off a cell; heads and lengths in the document's unit, half-widths at 95 %. */
export type GradientReading = {
  readonly headDifference: number;
  /** Contributions to the head difference. */
  readonly headDoubt: Contributions;
  readonly length: number;
  /** Half-width of a traced place. */
  readonly tracing: number;
};

/**
 * Half-width (95 %) of a cell's average gradient i = Δh/ℓ: the head's own, and the two ends of the length, each off by
 * the accuracy of tracing, U(i)² = (U(Δh)/ℓ)² + 2·(i·U/ℓ)². Source: JCGM 100 (2008), 5.1.2.
 */
export function gradientPlusMinus(reading: GradientReading): number {
  const { headDifference, headDoubt, length, tracing } = reading;
  const end = (headDifference * tracing) / (length * length);
  const ends: Contribution[] = [
    { cause: 'cell start', source: 'tracing', amount: end },
    { cause: 'cell end', source: 'tracing', amount: -end },
  ];
  return halfWidth(
    weightedSum([
      [1 / length, headDoubt],
      [1, ends],
    ]),
  );
}
