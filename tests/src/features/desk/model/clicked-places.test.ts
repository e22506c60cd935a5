import { describe, expect, it } from 'vitest';
import { createClickedPlaces } from '#client/features/desk/model/clicked-places.ts';
import { LINE_A, LINE_B } from '#tests/support/desk/desk-fixture.ts';

describe('the places clicked on a line', () => {
  it('are told among its vertices, whichever way round, and none of another line', () => {
    const clicked = createClickedPlaces();
    clicked.remember(LINE_A, [
      { at: [0, 0], way: null },
      { at: [30, 5], way: 'smooth' },
    ]);
    const dense: Array<[number, number]> = [
      [0, 0],
      [10, 3],
      [20, 4],
      [30, 5],
    ];
    expect([...clicked.among(LINE_A, dense).keys()]).toEqual([0, 3]);
    expect([...clicked.among(LINE_A, [...dense].reverse()).keys()]).toEqual([0, 3]);
    expect(clicked.among(LINE_B, dense).size).toBe(0);
    expect([...clicked.among(LINE_A, dense.slice(0, 3)).keys()]).toEqual([0]);
  });

  it('keep how a piece was drawn when its end is gone on from', () => {
    const clicked = createClickedPlaces();
    clicked.remember(LINE_A, [{ at: [30, 5], way: 'smooth' }]);
    clicked.remember(LINE_A, [{ at: [30, 5], way: null }]);
    expect(clicked.among(LINE_A, [[30, 5]]).get(0)?.way).toBe('smooth');
  });
});
