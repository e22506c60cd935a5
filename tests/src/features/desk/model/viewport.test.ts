import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  fitFrame,
  fitSheet,
  MAX_ZOOM,
  panBy,
  resized,
  seenFrame,
  seenThrough,
  toScreen,
  toSheet,
  type Viewport,
  zoomAbout,
} from '#client/features/desk/model/viewport.ts';
import { screenPx, sheetPx } from '#shared/compute/frames.ts';
import type { LinearMap } from '#shared/compute/linear-map.ts';

const sheet = { widthPx: 10_000, heightPx: 7_000 };
const view: Viewport = { zoom: 0.5, origin: sheetPx(1000, 500), widthPx: 1200, heightPx: 800 };

describe('the viewport', () => {
  it('maps the sheet to the screen and back', () => {
    const at = sheetPx(1234.5, 678.9);
    const back = toSheet(view, toScreen(view, at));
    expect(back[0]).toBeCloseTo(at[0], 9);
    expect(back[1]).toBeCloseTo(at[1], 9);
  });

  it('keeps the place under the pointer where it is while zooming', () => {
    const pointer = screenPx(333, 222);
    const before = toSheet(view, pointer);
    const after = toSheet(zoomAbout(view, pointer, 1.7, sheet), pointer);
    expect(after[0]).toBeCloseTo(before[0], 9);
    expect(after[1]).toBeCloseTo(before[1], 9);
  });

  it('holds the zoom between a part of the fitted size and one pixel seen as a square', () => {
    const pointer = screenPx(600, 400);
    expect(zoomAbout(view, pointer, 1e9, sheet).zoom).toBe(MAX_ZOOM);
    const smallest = zoomAbout(view, pointer, 1e-9, sheet).zoom;
    expect(smallest).toBeCloseTo(fitSheet(view, sheet).zoom * 0.4, 9);
  });

  it('never loses the sheet however far it is dragged', () => {
    for (const [dx, dy] of [
      [1e6, 0],
      [-1e6, 0],
      [0, 1e6],
      [0, -1e6],
    ] as const) {
      const [left, top, width, height] = seenFrame(panBy(view, dx, dy, sheet));
      expect(left).toBeLessThan(sheet.widthPx);
      expect(top).toBeLessThan(sheet.heightPx);
      expect(left + width).toBeGreaterThan(0);
      expect(top + height).toBeGreaterThan(0);
    }
  });

  it('shows a frame whole and centred when fitted', () => {
    const fitted = fitFrame(view, [2000, 1000, 4000, 1000]);
    const corner = toScreen(fitted, sheetPx(2000, 1000));
    const other = toScreen(fitted, sheetPx(6000, 2000));
    expect(corner[0]).toBeGreaterThanOrEqual(0);
    expect(other[0]).toBeLessThanOrEqual(fitted.widthPx);
    expect((corner[0] + other[0]) / 2).toBeCloseTo(600, 6);
    expect((corner[1] + other[1]) / 2).toBeCloseTo(400, 6);
  });

  it('keeps the middle in the middle when the window changes its size', () => {
    const wider = resized(view, 1600, 700, sheet);
    const before = toSheet(view, screenPx(600, 400));
    const after = toSheet(wider, screenPx(800, 350));
    expect(after[0]).toBeCloseTo(before[0], 9);
    expect(after[1]).toBeCloseTo(before[1], 9);
  });
});

describe('a sheet seen through a map', () => {
  const map = fc
    .tuple(
      fc.double({ min: 0.05, max: 1, noNaN: true }),
      fc.double({ min: 0.05, max: 1, noNaN: true }),
      fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
    )
    .map(([along, across, turn]): LinearMap => {
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      // Shortened by `along` in a direction and by `across` square to it, so that it is never flat.
      return [
        along * c * c + across * s * s,
        (along - across) * c * s,
        (along - across) * c * s,
        along * s * s + across * c * c,
      ];
    });

  it('maps every place on screen back to the sheet, keeps it while zooming, and shows a fitted frame whole', () => {
    fc.assert(
      fc.property(map, fc.tuple(fc.nat(1200), fc.nat(800)), (seenAs, [x, y]) => {
        const seen = fitFrame({ ...view, seenAs }, [2000, 1000, 4000, 1000]);
        for (const [cornerX, cornerY] of [
          [2000, 1000],
          [6000, 1000],
          [2000, 2000],
          [6000, 2000],
        ] as const) {
          const [cx, cy] = toScreen(seen, sheetPx(cornerX, cornerY));
          expect(Math.min(cx, cy, view.widthPx - cx, view.heightPx - cy)).toBeGreaterThan(0);
        }
        const pointer = screenPx(x, y);
        const at = toSheet(seen, pointer);
        expect(Math.hypot(toScreen(seen, at)[0] - x, toScreen(seen, at)[1] - y)).toBeLessThan(1e-6);
        // About the middle, so that nothing has to be held in sight.
        const middle = screenPx(600, 400);
        const [before, after] = [seen, zoomAbout(seen, middle, 1.7, sheet)].map((each) =>
          toSheet(each, middle),
        );
        expect(Math.hypot(after![0] - before![0], after![1] - before![1])).toBeLessThan(1e-6);
        const [left, top, width, height] = seenFrame(seen);
        expect(at[0]).toBeGreaterThan(left - 1e-6);
        expect(at[0]).toBeLessThan(left + width + 1e-6);
        expect(at[1]).toBeGreaterThan(top - 1e-6);
        expect(at[1]).toBeLessThan(top + height + 1e-6);
      }),
    );
  });

  it('has the same place in its middle as before, and is the drawing again without the map', () => {
    const middle = screenPx(600, 400);
    const through = seenThrough(view, [1 / 3, 0, 0, 1], sheet);
    expect(toSheet(through, middle)[0]).toBeCloseTo(toSheet(view, middle)[0], 6);
    expect(seenThrough(through, null, sheet)).toEqual(view);
  });

  it('cannot be lost however far it is dragged', () => {
    const seen = panBy(seenThrough(view, [1 / 3, 0, 0, 1], sheet), 1e6, -1e6, sheet);
    const [left, top, width, height] = seenFrame(seen);
    expect([left < sheet.widthPx, left + width > 0, top < sheet.heightPx, top + height > 0]).toEqual([
      true,
      true,
      true,
      true,
    ]);
  });
});
