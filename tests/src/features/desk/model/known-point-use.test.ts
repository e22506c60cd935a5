import { describe, expect, it } from 'vitest';
import { nextKnownPointUse } from '#client/features/desk/model/known-point-use.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { type Known, known, sectionOf } from '#tests/support/known-points.ts';

/** Corners of a rectangle of 40 × 20 m at 0.04 m a pixel, and its middle. */
const POINTS: Known[] = [
  known(100, 600, 0, 100),
  known(1100, 100, 40, 120),
  known(1100, 600, 40, 100),
  known(100, 100, 0, 120),
  known(600, 350, 20, 110),
];

describe('what the next known point is for', () => {
  it.each([
    [{ scales: 'equal' }, 2],
    [{ scales: 'plottingExaggeration' }, 3],
    [{ scales: 'transformedSection' }, 3],
    [{ scales: 'transformedSection', level: 'sheet' }, 2],
    [{ scales: 'stretchedPaper' }, 3],
    [{ scales: 'perspective' }, 4],
  ] as const)('with %o the first %i set the section out, and that is just enough', (setOut, needed) => {
    const placed: Known[] = [];
    for (const point of POINTS) placed.push({ ...point, use: nextKnownPointUse(sectionOf(placed, setOut)) });
    expect(placed.map(({ use }) => use)).toEqual(POINTS.map((_, i) => (i < needed ? 'fit' : 'check')));
    expect(readSetOut(sectionOf(placed, setOut)).reading.state).toBe('fitted');
    expect(readSetOut(sectionOf(placed.slice(0, needed - 1), setOut)).reading.state).not.toBe('fitted');
  });
});
