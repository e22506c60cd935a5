import { describe, expect, it } from 'vitest';
import {
  acceptanceWithdrawalRefusal,
  type DecisionFacts,
  decisionRefusal,
  sendingWithdrawalRefusal,
} from '#server/policies/revision-policy.ts';

const facts: DecisionFacts = {
  personId: 'reviewer',
  reviewerIds: ['reviewer', 'second'],
  drawnBy: ['drawer'],
  sentBy: 'sender',
  state: 'waiting',
  decidedBy: [],
  supersededBy: null,
};

describe('who may decide on a revision', () => {
  it('is the reviewer it was sent to', () => {
    expect(decisionRefusal(facts)).toBeNull();
  });

  it.each([
    ['once it is decided', { state: 'accepted' }, 'already-decided'],
    ['once it is withdrawn', { state: 'withdrawn' }, 'already-decided'],
    ['who has accepted already', { decidedBy: ['reviewer'] }, 'already-decided'],
    ['for who drew it', { personId: 'drawer', reviewerIds: ['drawer'] }, 'own-work'],
    ['for who sent it', { personId: 'sender', reviewerIds: ['sender'] }, 'own-work'],
    ['for another reviewer', { personId: 'other' }, 'forbidden'],
    ['when a later one was sent', { supersededBy: 'B' }, 'conflict'],
  ] as const)('is nobody %s', (_when, change, code) => {
    expect(decisionRefusal({ ...facts, ...change })?.code).toBe(code);
  });
});

describe('withdrawing', () => {
  it('an acceptance is for any reviewer who did not draw', () => {
    const accepted = { ...facts, personId: 'another reviewer', state: 'accepted' as const };
    expect(acceptanceWithdrawalRefusal(accepted)).toBeNull();
    expect(acceptanceWithdrawalRefusal({ ...accepted, personId: 'drawer' })?.code).toBe('own-work');
    expect(acceptanceWithdrawalRefusal({ ...accepted, state: 'returned' })?.code).toBe('conflict');
    expect(acceptanceWithdrawalRefusal({ ...accepted, state: 'acceptanceWithdrawn' })?.code).toBe('conflict');
  });

  it('a sending ends with the decision', () => {
    expect(sendingWithdrawalRefusal('waiting')).toBeNull();
    for (const state of ['accepted', 'acceptedWithNotes', 'returned', 'withdrawn'] as const)
      expect(sendingWithdrawalRefusal(state)?.code).toBe('already-decided');
  });
});
