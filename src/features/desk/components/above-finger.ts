import type { ScreenPx } from '#shared/compute/frames.ts';

/** From the finger's middle to the near edge of the magnified view: a fingertip and the hand behind it stay clear. */
const CLEAR_PX = 56;
const EDGE_PX = 8;

type Size = { readonly widthPx: number; readonly heightPx: number };

/**
 * Where a square of a side is set so that a finger does not cover it: above the finger, and where the view ends there,
 * beside it on the side with more room.
 */
export function aboveFinger(finger: ScreenPx, side: number, view: Size): { left: number; top: number } {
  const within = (start: number, whole: number) => Math.max(EDGE_PX, Math.min(whole - side - EDGE_PX, start));
  const above = finger[1] - CLEAR_PX - side;
  if (above >= EDGE_PX) return { left: within(finger[0] - side / 2, view.widthPx), top: above };
  const leftwards = finger[0] > view.widthPx / 2;
  return {
    left: within(leftwards ? finger[0] - CLEAR_PX - side : finger[0] + CLEAR_PX, view.widthPx),
    top: within(above, view.heightPx),
  };
}
