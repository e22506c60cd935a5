import { describe, expect, it } from 'vitest';
import {
  fitFrame,
  fitSheet,
  MAX_ZOOM,
  panBy,
  resized,
  seenFrame,
  toScreen,
  toSheet,
  type Viewport,
  zoomAbout,
} from '#client/features/desk/model/viewport.ts';
import { screenPx, sheetPx } from '#shared/compute/frames.ts';

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
