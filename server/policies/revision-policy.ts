import type { ProblemCode } from '#shared/contract/problem.ts';

/** What decides whether a person may decide on a revision, besides the reviewer's part on the dam. */
export interface DecisionFacts {
  personId: string;
  reviewerId: string;
  drawnBy: readonly string[];
  sentBy: string;
  decided: boolean;
  /** Label of a later revision of the same net; null when this is the newest. */
  supersededBy: string | null;
}

export interface DecisionRefusal {
  code: ProblemCode;
  text: string;
}

/** Null when the person may decide; otherwise what says why not. Who drew cannot accept. */
export function decisionRefusal(facts: DecisionFacts): DecisionRefusal | null {
  if (facts.decided)
    return {
      code: 'already-decided',
      text: 'This revision has been decided. A later decision needs a new revision.',
    };
  if (facts.drawnBy.includes(facts.personId) || facts.sentBy === facts.personId)
    return { code: 'own-work', text: 'You drew or sent this net, so another person has to check it.' };
  if (facts.reviewerId !== facts.personId)
    return { code: 'forbidden', text: 'This revision was sent to another reviewer.' };
  if (facts.supersededBy !== null)
    return {
      code: 'conflict',
      text: `Revision ${facts.supersededBy} of this net was sent since. Decide on that one.`,
    };
  return null;
}
