import * as z from 'zod/mini';

/** What an error comes from, as the engineer is told. */
export const doubtSource = z.enum([
  'knownPoints',
  'tracing',
  'place',
  'waterLevels',
  'datum',
  'tip',
  'gammaW',
  'permeability',
]);
export type DoubtSource = z.infer<typeof doubtSource>;

/** Parts of the variance by source, the greatest first; they add to 1, or there are none when nothing is in doubt. */
export const doubtShares = z.array(z.object({ source: doubtSource, part: z.number() }));
export type DoubtShares = z.infer<typeof doubtShares>;

/** Half-widths of the quantities at 95 %, document length unit; null where the quantity is. */
export const quantityDoubt = z.object({
  headLost: z.nullable(z.number()),
  headPerDrop: z.nullable(z.number()),
  /** Factor (×/÷) within which the seepage is known; null while k has none. */
  seepageFactor: z.nullable(z.number()),
  /** Of the variance of ln q. */
  seepageShares: doubtShares,
});
export type QuantityDoubt = z.infer<typeof quantityDoubt>;
