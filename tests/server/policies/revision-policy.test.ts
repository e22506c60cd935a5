import { describe, expect, it } from 'vitest';
import { type DecisionFacts, decisionRefusal } from '#server/policies/revision-policy.ts';

const facts: DecisionFacts = {
  personId: 'reviewer',
  reviewerId: 'reviewer',
  drawnBy: ['drawer'],
  sentBy: 'sender',
  decided: false,
  supersededBy: null,
};

describe('who may decide on a revision', () => {
  it('is the reviewer it was sent to', () => {
    expect(decisionRefusal(facts)).toBeNull();
  });

  it.each([
    ['once it is decided', { decided: true }, 'already-decided'],
    ['for who drew it', { personId: 'drawer', reviewerId: 'drawer' }, 'own-work'],
    ['for who sent it', { personId: 'sender', reviewerId: 'sender' }, 'own-work'],
    ['for another reviewer', { personId: 'other' }, 'forbidden'],
    ['when a later one was sent', { supersededBy: 'B' }, 'conflict'],
  ] as const)('is nobody %s', (_when, change, code) => {
    expect(decisionRefusal({ ...facts, ...change })?.code).toBe(code);
  });
});
