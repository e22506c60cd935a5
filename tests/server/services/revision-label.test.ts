import { describe, expect, it } from 'vitest';
import { revisionLabel } from '#server/services/revision-label.ts';

describe('the letter of a revision', () => {
  it('runs from A to Z and goes on with AA', () => {
    expect([1, 2, 26, 27, 28, 52, 53, 702, 703].map(revisionLabel)).toEqual([
      'A',
      'B',
      'Z',
      'AA',
      'AB',
      'AZ',
      'BA',
      'ZZ',
      'AAA',
    ]);
  });
});
