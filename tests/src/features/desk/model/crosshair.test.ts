import { describe, expect, it } from 'vitest';
import { firstPlace, panToSee, stepped } from '#client/features/desk/model/crosshair.ts';
import { toScreen, type Viewport } from '#client/features/desk/model/viewport.ts';
import { sheetPx } from '#shared/compute/frames.ts';

const VIEW: Viewport = { zoom: 0.25, origin: sheetPx(100, 200), widthPx: 800, heightPx: 600 };
const AT = sheetPx(1000, 900);

describe('the crosshair', () => {
  it('steps by one and ten pixels of the screen, and by a tenth of one of the sheet', () => {
    expect(stepped(VIEW, AT, 1, 0, 'one')).toEqual([1004, 900]);
    expect(stepped(VIEW, AT, 0, -1, 'ten')).toEqual([1000, 860]);
    const [x, y] = stepped(VIEW, AT, -1, 0, 'tenth');
    expect(x).toBeCloseTo(999.9, 10);
    expect(y).toBe(900);
  });

  it('steps as it is seen where the sheet is seen turned', () => {
    const turned: Viewport = { ...VIEW, seenAs: [0, 1, -1, 0] };
    const from = toScreen(turned, AT);
    const to = toScreen(turned, stepped(turned, AT, 1, 0, 'one'));
    expect(to[0] - from[0]).toBeCloseTo(1, 9);
    expect(to[1] - from[1]).toBeCloseTo(0, 9);
  });

  it('takes the sheet with it near the edges only', () => {
    expect(panToSee(VIEW, AT)).toEqual([0, 0]);
    // At 10 px from the left edge and 30 px below the lower one.
    expect(panToSee(VIEW, sheetPx(140, 2720))).toEqual([50, -90]);
  });

  it('comes up at the first place that is seen, else in the middle', () => {
    expect(firstPlace(VIEW, null, AT)).toEqual(AT);
    expect(firstPlace(VIEW, sheetPx(0, 0), AT)).toEqual(AT);
    expect(firstPlace(VIEW, sheetPx(0, 0), null)).toEqual([1700, 1400]);
  });
});
