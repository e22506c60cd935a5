import type { ScreenPx } from '#shared/compute/frames.ts';

/** From the finger's middle to the near edge of the magnified view: a fingertip and the hand behind it stay clear. */
const CLEAR_PX = 56;
/** Beside it less will do: the hand comes from below. */
const BESIDE_PX = 40;
const EDGE_PX = 8;

type Size = { readonly widthPx: number; readonly heightPx: number };

/**
 * Where a square of a side is set so that a finger does not cover it: above the finger; where the view ends there,
 * beside it on the side with more room; and where the view is too narrow for that, below.
 */
export function aboveFinger(finger: ScreenPx, side: number, view: Size): { left: number; top: number } {
  const within = (start: number, whole: number) => Math.max(EDGE_PX, Math.min(whole - side - EDGE_PX, start));
  const above = finger[1] - CLEAR_PX - side;
  const left = within(finger[0] - side / 2, view.widthPx);
  if (above >= EDGE_PX) return { left, top: above };
  const beside = finger[0] > view.widthPx / 2 ? finger[0] - BESIDE_PX - side : finger[0] + BESIDE_PX;
  if (beside >= EDGE_PX && beside + side + EDGE_PX <= view.widthPx) {
    return { left: beside, top: within(above, view.heightPx) };
  }
  return { left, top: finger[1] + CLEAR_PX };
}
