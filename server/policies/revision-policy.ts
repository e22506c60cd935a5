import type { ProblemCode } from '#shared/contract/problem.ts';
import type { RevisionState } from '#shared/contract/revisions.ts';

/** What decides whether a person may decide on a revision, besides the reviewer's part on the dam. */
export interface DecisionFacts {
  personId: string;
  reviewerIds: readonly string[];
  drawnBy: readonly string[];
  sentBy: string;
  state: RevisionState;
  /** Those who have accepted already, of several reviewers. */
  decidedBy: readonly string[];
  /** Label of a later revision of the same net; null when this is the newest. */
  supersededBy: string | null;
}

export interface DecisionRefusal {
  code: ProblemCode;
  text: string;
}

const WITHDRAWN: DecisionRefusal = {
  code: 'already-decided',
  text: 'The engineer has withdrawn this revision from checking.',
};
const DECIDED: DecisionRefusal = {
  code: 'already-decided',
  text: 'This revision has been decided. A later decision needs a new revision.',
};
const DECIDED_BY_YOU: DecisionRefusal = {
  code: 'already-decided',
  text: 'You have decided on this revision. It waits for the other reviewers.',
};
const OWN_WORK: DecisionRefusal = {
  code: 'own-work',
  text: 'You drew or sent this net, so another person has to check it.',
};

const isOwnWork = ({ drawnBy, personId, sentBy }: Pick<DecisionFacts, 'drawnBy' | 'personId' | 'sentBy'>) =>
  drawnBy.includes(personId) || sentBy === personId;

/** Null when the person may decide; otherwise what says why not. Who drew cannot accept. */
export function decisionRefusal(facts: DecisionFacts): DecisionRefusal | null {
  if (facts.state === 'withdrawn') return WITHDRAWN;
  if (facts.state !== 'waiting') return DECIDED;
  if (isOwnWork(facts)) return OWN_WORK;
  if (!facts.reviewerIds.includes(facts.personId))
    return { code: 'forbidden', text: 'This revision was sent to another reviewer.' };
  if (facts.decidedBy.includes(facts.personId)) return DECIDED_BY_YOU;
  if (facts.supersededBy !== null)
    return {
      code: 'conflict',
      text: `Revision ${facts.supersededBy} of this net was sent since. Decide on that one.`,
    };
  return null;
}

/**
 * Null when the person, a reviewer of the dam, may withdraw the acceptance of a revision: any reviewer who did not draw
 * it, since whoever accepted wrongly may be gone by the time it is found.
 */
export function acceptanceWithdrawalRefusal(
  facts: Pick<DecisionFacts, 'personId' | 'drawnBy' | 'sentBy' | 'state'>,
): DecisionRefusal | null {
  if (facts.state !== 'accepted' && facts.state !== 'acceptedWithNotes')
    return {
      code: 'conflict',
      text: 'This revision is not accepted, so there is no acceptance to withdraw.',
    };
  return isOwnWork(facts) ? OWN_WORK : null;
}

/** Null when the sending of a revision in this state may be taken back. */
export function sendingWithdrawalRefusal(state: RevisionState): DecisionRefusal | null {
  if (state === 'waiting') return null;
  return state === 'withdrawn'
    ? { code: 'already-decided', text: 'This revision has been withdrawn already.' }
    : { code: 'already-decided', text: 'This revision has been decided, so it can no longer be withdrawn.' };
}
