import * as z from 'zod/mini';

/** A reviewer's decision, or that an acceptance or the sending itself was withdrawn. */
export const decisionKind = z.enum([
  'accepted',
  'acceptedWithNotes',
  'returned',
  'acceptanceWithdrawn',
  'sendingWithdrawn',
]);
export type DecisionKind = z.infer<typeof decisionKind>;
