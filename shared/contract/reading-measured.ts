import * as z from 'zod/mini';

/** What an instrument showed at a reading point, beside what the net gives there. Heads in the document's length unit. */
export const measuredReading = z.object({
  /** The reading point. */
  id: z.string(),
  /** Total head measured, above the datum; null where a pressure was typed and the point has no elevation yet. */
  head: z.nullable(z.number()),
  headPlusMinus: z.nullable(z.number()),
  /** Measured minus net, as total head: positive is adverse. Null where the net gives no head. */
  difference: z.nullable(z.number()),
  /** ± of the difference at 95 %; null while neither ± is known. */
  differencePlusMinus: z.nullable(z.number()),
  /** True when the difference is farther from zero than its ±. */
  beyond: z.boolean(),
  /** True when a pressure beyond its ± was measured where the net has none, above its phreatic line. */
  wetAboveNet: z.boolean(),
});
export type MeasuredReading = z.infer<typeof measuredReading>;
