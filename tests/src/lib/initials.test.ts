import { describe, expect, it } from 'vitest';
import { initialsOf, shortName } from '#client/lib/initials.ts';

describe('a name in short', () => {
  it.each([
    ['Iris Marsh', 'IM', 'I. Marsh'],
    ['Tove', 'T', 'Tove'],
    ['Anna Maria van Dijk', 'AD', 'A. Dijk'],
    ['', '', ''],
    ['Éva Ördög', 'ÉÖ', 'É. Ördög'],
  ])('%j is %j on the account and %j beside a note', (name, initials, short) => {
    expect([initialsOf(name), shortName(name)]).toEqual([initials, short]);
  });
});
