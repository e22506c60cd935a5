import { describe, expect, it } from 'vitest';
import { decimalsOf, roundStep, sectionGridOf } from '#client/features/desk/model/section-grid.ts';
import { toSheet, type Viewport } from '#client/features/desk/model/viewport.ts';
import { screenPx, sheetPx } from '#shared/compute/frames.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { known, sectionOf } from '#tests/support/known-points.ts';

/** 0.05 m to the pixel, turned by a little over a degree. */
const map = readSetOut(sectionOf([known(100, 1500, 0, 90), known(2100, 1540, 100, 90)])).map!;
const view = (more: Partial<Viewport> = {}): Viewport => ({
  zoom: 0.5,
  origin: sheetPx(0, 0),
  widthPx: 1200,
  heightPx: 800,
  ...more,
});

describe('the grid over the sheet', () => {
  it('is none in a view of no size', () => {
    expect(sectionGridOf(map, view({ widthPx: 0 }))).toBeNull();
  });

  it('has round steps that stand at least 90 px apart at every zoom', () => {
    for (const zoom of [0.05, 0.11, 0.5, 1, 3, 17, 40]) {
      const { offsetStep, elevationStep } = sectionGridOf(map, view({ zoom }))!;
      expect(offsetStep).toBe(elevationStep);
      expect([1, 2, 5]).toContain(Math.round(offsetStep / 10 ** Math.floor(Math.log10(offsetStep) + 1e-9)));
      expect((offsetStep / 0.05) * zoom).toBeGreaterThan(89.9);
      expect((offsetStep / 0.05) * zoom).toBeLessThan(230);
    }
  });

  it.each([
    ['as drawn', {}],
    ['seen through a map', { seenAs: [1, 0, 0, 0.4] as const }],
  ])('lies where the set-out puts its values, %s', (_, more) => {
    const seen = view({ ...(more as Partial<Viewport>) });
    const { lines } = sectionGridOf(map, seen)!;
    expect(lines.length).toBeGreaterThan(6);
    for (const { of, value, from, to } of lines) {
      for (const part of [0, 0.37, 1]) {
        const [x, y] = [from[0] + part * (to[0] - from[0]), from[1] + part * (to[1] - from[1])];
        const at = map.toSection(toSheet(seen, screenPx(x, y)));
        expect(at[of === 'offset' ? 0 : 1]).toBeCloseTo(value, 6);
      }
    }
  });

  it('names its lines at the edge of the view', () => {
    const { lines } = sectionGridOf(map, view())!;
    const named = lines.filter(({ label }) => label !== null);
    expect(named.length).toBeGreaterThan(lines.length - 4);
    for (const { of, label } of named) {
      if (of === 'offset') expect(label![1]).toBe(794);
      else expect(label![0]).toBe(6);
    }
  });

  it('takes the decimals that a step needs', () => {
    expect([5, 0.5, 0.02, 100].map(decimalsOf)).toEqual([0, 1, 2, 0]);
    expect([0.9, 1, 1.1, 30, 50.1].map(roundStep)).toEqual([1, 1, 2, 50, 100]);
  });
});
