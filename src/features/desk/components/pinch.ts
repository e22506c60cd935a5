import { type ScreenPx, screenPx } from '#shared/compute/frames.ts';

/** What a movement of two fingers does to the view: how far it moves, and how it is zoomed about which place. */
export type PinchStep = {
  readonly dxPx: number;
  readonly dyPx: number;
  readonly factor: number;
  readonly about: ScreenPx;
};

type Two = readonly [ScreenPx, ScreenPx];

export function pinchStep([a, b]: Two, [c, d]: Two): PinchStep {
  return {
    dxPx: (c[0] + d[0] - a[0] - b[0]) / 2,
    dyPx: (c[1] + d[1] - a[1] - b[1]) / 2,
    factor: apart(c, d) / Math.max(1, apart(a, b)),
    about: screenPx((c[0] + d[0]) / 2, (c[1] + d[1]) / 2),
  };
}

export function apart(a: ScreenPx, b: ScreenPx): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1]);
}
