import { type ScreenPx, screenPx } from '#shared/compute/frames.ts';

/** A finger moved slower than this places finely, faster than `FAST` it carries the place along, pixels a millisecond. */
const SLOW = 0.06;
const FAST = 0.5;
/** Pixels the place moves for each pixel of a slow finger. */
const FINEST = 0.15;
/** A finger at rest sends nothing: the time before its first movement says nothing of its speed. */
const LONGEST_STEP_MS = 32;

/** How much of a finger's movement the place held makes: little of a slow one, all of a fast one. */
export function fineGain(pxPerMs: number): number {
  const share = Math.min(1, Math.max(0, (pxPerMs - SLOW) / (FAST - SLOW)));
  return FINEST + share * (1 - FINEST);
}

/** Where a place held by a finger goes as the finger moves from one place to the next in so many milliseconds. */
export function fineTravel(place: ScreenPx, from: ScreenPx, to: ScreenPx, ms: number): ScreenPx {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const gain = fineGain(Math.hypot(dx, dy) / Math.min(LONGEST_STEP_MS, Math.max(1, ms)));
  return screenPx(place[0] + dx * gain, place[1] + dy * gain);
}
