import { describe, expect, it } from 'vitest';
import {
  figuresOf,
  pageOf,
  withFigure,
  withPointAfter,
} from '#client/features/desk/components/vertex-rows.ts';
import { sectionMapOfFit } from '#shared/compute/section-map.ts';
import { tracedLine } from '#tests/support/desk/desk-fixture.ts';

const line = tracedLine([
  [100, 100],
  [200, 140],
  [300, 100],
]);
/** Drawn askew and to two scales, so that typing one figure moves both pixels. */
const map = sectionMapOfFit({
  linear: [0.05, 0.004, -0.003, -0.1],
  sheetOrigin: [200, 140],
  sectionOrigin: [12.5, 98],
});

describe('the figures of a point', () => {
  it('are pixels until the section is set out, then offset and elevation', () => {
    expect(figuresOf(line.points[1]!, 'section', null)).toEqual([200, 140]);
    expect(figuresOf(line.points[1]!, 'section', map)).toEqual([12.5, 98]);
    expect(figuresOf(line.points[1]!, 'sheet', map)).toEqual([200, 140]);
  });

  it('come back as they were typed, the other one unchanged', () => {
    const offset = withFigure(line, 1, 0, 13.375, 'section', map)!;
    const both = withFigure(offset, 1, 1, 97.125, 'section', map)!;
    const [x, z] = figuresOf(both.points[1]!, 'section', map);
    expect(x).toBeCloseTo(13.375, 4);
    expect(z).toBeCloseTo(97.125, 4);
    expect(both.points[0]).toBe(line.points[0]);
    expect(withFigure(line, 2, 1, 90.5, 'sheet', map)!.points[2]).toEqual([300, 90.5]);
  });

  it('are refused off the sheet and for a point that is not there', () => {
    expect(withFigure(line, 1, 0, 1e6, 'section', map)).toBeNull();
    expect(withFigure(line, 9, 0, 1, 'sheet', null)).toBeNull();
  });
});

describe('a point put in', () => {
  it('lies half way to the next, and after the last one as far on again', () => {
    expect(withPointAfter(line, 0)!.points[1]).toEqual([150, 120]);
    expect(withPointAfter(line, 2)!.points[3]).toEqual([400, 60]);
    expect(withPointAfter(tracedLine([[5, 5]]), 0)!.points).toEqual([
      [5, 5],
      [6, 5],
    ]);
    expect(withPointAfter(line, 3)).toBeNull();
  });
});

describe('the pages of a long line', () => {
  it.each([
    [0, 3, 0, 2],
    [49, 5000, 0, 49],
    [50, 5000, 50, 99],
    [4999, 5000, 4950, 4999],
    [120, 60, 50, 59],
    [-50, 60, 0, 49],
  ])('point %i of %i is on the page from %i to %i', (index, count, first, last) => {
    expect(pageOf(index, count)).toEqual({ first, last });
  });
});
