import { describe, expect, it } from 'vitest';
import { legendEntries } from '#client/features/desk/model/picture-legend.ts';
import { distinctEntries } from '#client/features/desk/render/legend-scene.ts';
import { documentWith, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const POINTS: Array<[number, number]> = [
  [0, 0],
  [10, 10],
];
const id = (n: number) => `0000000${n}-0000-7000-8000-000000000000`;
const net = documentWith({
  [id(1)]: tracedLine(POINTS, { line: 'flowLine' }),
  [id(2)]: tracedLine(POINTS),
  [id(3)]: tracedLine(POINTS, { finished: false }),
  [id(4)]: tracedLine(POINTS, { line: 'phreaticLine', origin: 'guessed' }),
  [id(5)]: { kind: 'knownPoint', name: 'K1', at: [1, 2], offset: null, elevation: null, use: 'fit' },
});
const words = (hidden: Parameters<typeof legendEntries>[1], notes = 0, heads = false) =>
  distinctEntries(legendEntries(net, hidden, { notes, heads })).map((entry) =>
    entry.shows === 'line' ? `${entry.kind} ${entry.way}` : entry.shows,
  );

describe('the legend', () => {
  it('explains what is drawn, and nothing else', () => {
    expect(words([])).toEqual([
      'equipotential traced',
      'equipotential unfinished',
      'flowLine traced',
      'phreaticLine guessed',
      'knownPoint',
    ]);
  });

  it('leaves out what is hidden', () => {
    expect(words(['equipotential', 'knownPoint'], 2, true)).toEqual([
      'flowLine traced',
      'phreaticLine guessed',
      'note',
    ]);
  });

  it('explains heads and notes where there are any', () => {
    expect(words([], 1, true)).toEqual(expect.arrayContaining(['head', 'note']));
  });
});
