import { describe, expect, it } from 'vitest';
import { lineRows } from '#client/features/desk/model/entity-rows.ts';
import { freeName, typedKnownPoint, typedLine } from '#client/features/desk/model/typed-entities.ts';
import { documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const line = tracedLine([
  [0, 0],
  [10, 0],
]);
const LINE_B = '019a3c00-0000-7000-8000-0000000000bb';

describe('lines as a table', () => {
  it('stand by kind, each with how it stands', () => {
    const document = documentWith({
      [LINE_B]: { ...line, line: 'impervious', finished: false },
      [LINE_A]: { ...line, line: 'equipotential', origin: 'adopted' },
    });
    const rows = lineRows({
      document,
      reading: null,
      hiddenKinds: ['impervious'],
      lockedKinds: ['equipotential'],
    });
    expect(rows.map(({ id, states, locked }) => ({ id, states, locked }))).toEqual([
      { id: LINE_A, states: ['finished', 'locked', 'adopted'], locked: true },
      { id: LINE_B, states: ['unfinished', 'hidden'], locked: false },
    ]);
  });
});

describe('typed lines and points', () => {
  it('need two points, on or near the sheet', () => {
    expect(typedLine('ground', '', [[1, 2]], null)).toMatch(/two points/);
    expect(
      typedLine(
        'ground',
        '',
        [
          [1, 2],
          [1e9, 2],
        ],
        null,
      ),
    ).toMatch(/too far/);
    const made = typedLine(
      'ground',
      'G',
      [
        [1.23456, 2],
        [3, 4],
      ],
      null,
    );
    expect(made).toMatchObject({
      line: 'ground',
      name: 'G',
      finished: true,
      points: [
        [1.2346, 2],
        [3, 4],
      ],
    });
  });

  it('set the section out while fewer than two known points do', () => {
    const none = documentWith({});
    const first = typedKnownPoint(none, 'K1', [1, 2]);
    expect(first.use).toBe('fit');
    const two = documentWith({ [LINE_A]: first, [LINE_B]: { ...first, name: 'K2' } });
    expect(typedKnownPoint(two, 'K3', [1, 2]).use).toBe('check');
    expect(freeName(two, 'knownPoint', 'K')).toBe('K3');
  });
});
