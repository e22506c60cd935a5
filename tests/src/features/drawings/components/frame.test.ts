import { describe, expect, it } from 'vitest';
import { frameBetween, frameOnSheet, sheetPointAt } from '#client/features/drawings/components/frame.ts';

const sheet = { widthPx: 5000, heightPx: 2600 };

describe('the frame of a section', () => {
  it('is not made by a click', () => {
    expect(frameBetween([100, 100], [103, 900], sheet)).toBeNull();
  });

  it('is the same whichever corner the drag began at', () => {
    const wanted = [200, 300, 1000, 800];
    expect(frameBetween([200, 300], [1200, 1100], sheet)).toEqual(wanted);
    expect(frameBetween([1200, 1100], [200, 300], sheet)).toEqual(wanted);
    expect(frameBetween([1200, 300], [200, 1100], sheet)).toEqual(wanted);
  });

  it('is in whole pixels and holds what was dragged over', () => {
    expect(frameBetween([200.7, 300.2], [1200.1, 1100.9], sheet)).toEqual([200, 300, 1001, 801]);
  });

  it('ends at the edges of the sheet', () => {
    expect(frameBetween([-50, -20], [9000, 9000], sheet)).toEqual([0, 0, 5000, 2600]);
    expect(frameOnSheet([4000, 0, 3000, 500], sheet)).toEqual([4000, 0, 1000, 500]);
  });

  it('typed wholly off the sheet is none', () => {
    expect(frameOnSheet([6000, 0, 500, 500], sheet)).toBeNull();
  });

  it('is in sheet pixels whatever the size of the picture', () => {
    const box = { left: 10, top: 20, width: 500, height: 260 };
    expect(sheetPointAt({ clientX: 260, clientY: 150 }, box, sheet)).toEqual([2500, 1300]);
  });
});
