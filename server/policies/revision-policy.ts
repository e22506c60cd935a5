/** What decides whether a person may decide on a revision, besides the reviewer's part on the dam. */
export interface DecisionFacts {
  personId: string;
  reviewerId: string;
  drawnBy: readonly string[];
  sentBy: string;
  decided: boolean;
}

/** Null when the person may decide; otherwise the sentence that says why not. Who drew cannot accept. */
export function decisionRefusal(facts: DecisionFacts): string | null {
  if (facts.decided) return 'This revision has been decided. A later decision needs a new revision.';
  if (facts.drawnBy.includes(facts.personId) || facts.sentBy === facts.personId)
    return 'You drew or sent this net, so another person has to check it.';
  if (facts.reviewerId !== facts.personId) return 'This revision was sent to another reviewer.';
  return null;
}
