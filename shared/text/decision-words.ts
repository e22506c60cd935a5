import type { DecisionKind } from '#shared/contract/revisions.ts';

/** Words of records, for mails, events and calculation sheets: what somebody did, and what is said of the revision. */
export const DECISION_WORDS: Record<DecisionKind, { did: string; state: string }> = {
  accepted: { did: 'accepted', state: 'accepted' },
  acceptedWithNotes: { did: 'accepted with notes', state: 'accepted with notes' },
  returned: { did: 'returned', state: 'returned' },
  acceptanceWithdrawn: { did: 'withdrew the acceptance of', state: 'acceptance withdrawn' },
  sendingWithdrawn: { did: 'withdrew from checking', state: 'withdrawn from checking' },
};
