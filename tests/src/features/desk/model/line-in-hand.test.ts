import { describe, expect, it } from 'vitest';
import { lineInHand } from '#client/features/desk/model/line-in-hand.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { documentWith, LINE_A, LINE_B, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const line = tracedLine(
  [
    [0, 0],
    [10, 0],
    [20, 0],
  ],
  { finished: false },
);
const document = documentWith({ [LINE_A]: line, [LINE_B]: line });
const rubber = [sheetPx(20, 0), sheetPx(30, 5)] as const;

describe('the line in hand', () => {
  it('is none at rest, nor while several things are dragged at once', () => {
    expect(lineInHand({ document, draft: null, preview: {} }, { rubber: null })).toBeNull();
    const preview = { [LINE_A]: line, [LINE_B]: line };
    expect(lineInHand({ document, draft: null, preview }, { rubber: null })).toBeNull();
  });

  it('is the one under way with its next point, from either end and along the way it would run', () => {
    const draft = { lineId: LINE_A, atStart: false };
    const hand = lineInHand({ document, draft, preview: {} }, { rubber });
    expect(hand).toMatchObject({ id: LINE_A, index: 3 });
    expect(hand?.points.at(-1)).toEqual([30, 5]);
    const back = lineInHand({ document, draft: { ...draft, atStart: true }, preview: {} }, { rubber });
    expect(back?.points.slice(0, 3)).toEqual([...line.points].reverse());
    const bent = lineInHand({ document, draft, preview: {} }, { rubber, path: [[25, 1]] });
    expect(bent?.points.slice(3)).toEqual([
      [25, 1],
      [30, 5],
    ]);
  });

  it('is the one of which a vertex is dragged, and tells which', () => {
    const moved = tracedLine([
      [0, 0],
      [11, 4],
      [20, 0],
    ]);
    const hand = lineInHand({ document, draft: null, preview: { [LINE_A]: moved } }, { rubber: null });
    expect(hand).toMatchObject({ id: LINE_A, index: 1 });
  });
});
