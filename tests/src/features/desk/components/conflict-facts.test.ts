import { describe, expect, it } from 'vitest';
import { conflictFacts } from '#client/features/desk/components/conflict-facts.ts';
import { type DocumentEntity, UNSAID } from '#shared/contract/document.ts';
import { tracedLine } from '#tests/support/desk/desk-fixture.ts';

const levels = (headwater: number | null): DocumentEntity => ({
  kind: 'waterLevels',
  ...UNSAID.waterLevels,
  headwater,
  tailwater: null,
  gammaW: 9.81,
  source: '',
});

describe('two versions of one thing', () => {
  it('are compared by what differs only', () => {
    expect(conflictFacts(levels(111), levels(112))).toEqual([
      { name: 'Headwater', mine: '111', theirs: '112' },
    ]);
  });

  it('say when one of them was removed', () => {
    expect(conflictFacts(tracedLine([[1, 1]]), null)).toEqual([
      { name: 'line', mine: 'line', theirs: 'removed' },
    ]);
  });

  it('of a line show its points and its typed head', () => {
    const mine = tracedLine([
      [1, 1],
      [2, 2],
    ]);
    const theirs = tracedLine([[1, 1]], { head: 112 });
    expect(conflictFacts(mine, theirs)).toEqual([
      { name: 'Points', mine: '2: 1.0, 1.0 px; 2.0, 2.0 px', theirs: '1: 1.0, 1.0 px' },
      { name: 'Typed head', mine: '–', theirs: '112' },
    ]);
  });
});
