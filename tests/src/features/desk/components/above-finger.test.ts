import { describe, expect, it } from 'vitest';
import { aboveFinger } from '#client/features/desk/components/above-finger.ts';
import { screenPx } from '#shared/compute/frames.ts';

const PHONE = { widthPx: 390, heightPx: 560 };
const SIDE = 168;

/** True when the fingertip, a circle of 30 px, lies outside of the square. */
function isClear(finger: [number, number], place: { left: number; top: number }): boolean {
  const dx = Math.max(place.left - finger[0], 0, finger[0] - place.left - SIDE);
  const dy = Math.max(place.top - finger[1], 0, finger[1] - place.top - SIDE);
  return Math.hypot(dx, dy) >= 30;
}

describe('the magnified view of a finger', () => {
  it('stands above it, in its middle', () => {
    expect(aboveFinger(screenPx(200, 400), SIDE, PHONE)).toEqual({ left: 116, top: 176 });
  });

  it('is inside the view and never under the finger, wherever that is', () => {
    for (let x = 0; x <= PHONE.widthPx; x += 10) {
      for (let y = 0; y <= PHONE.heightPx; y += 10) {
        const place = aboveFinger(screenPx(x, y), SIDE, PHONE);
        expect(place.left).toBeGreaterThanOrEqual(0);
        expect(place.left + SIDE).toBeLessThanOrEqual(PHONE.widthPx);
        expect(place.top).toBeGreaterThanOrEqual(0);
        expect(isClear([x, y], place)).toBe(true);
      }
    }
  });
});
