import { createStore, type StoreApi } from 'zustand/vanilla';
import { type SheetPx, screenPx } from '#shared/compute/frames.ts';
import { steppedOnScreen, toScreen, toSheet, type Viewport } from './viewport.ts';

/** The crosshair that keys move over the sheet. */
export type Crosshair = {
  /** Where it stands on the sheet; null while it is put away. */
  readonly at: SheetPx | null;
  /** Where it stood last. */
  readonly last: SheetPx | null;
  /** Placed to a tenth of a pixel or typed: what is set there snaps to nothing. */
  readonly exact: boolean;
  /** True while it holds something that moves with it. */
  readonly holds: boolean;
};
export type CrosshairStore = StoreApi<Crosshair>;

export const createCrosshair = (): CrosshairStore =>
  createStore<Crosshair>(() => ({ at: null, last: null, exact: false, holds: false }));

/** `one` and `ten` pixels of the screen, a `tenth` of a pixel of the sheet. */
export type Stride = 'one' | 'ten' | 'tenth';
const TENTH_PX = 0.1;
const STRIDES_PX = { one: 1, ten: 10 } as const;

/** The place a step away, in a direction as it is seen. */
export function stepped(view: Viewport, at: SheetPx, dx: number, dy: number, stride: Stride): SheetPx {
  if (stride === 'tenth') return steppedOnScreen(view, at, dx * TENTH_PX, dy * TENTH_PX);
  const [x, y] = toScreen(view, at);
  const far = STRIDES_PX[stride];
  return toSheet(view, screenPx(x + dx * far, y + dy * far));
}

/** How near to the edge of the view it comes before the sheet moves, screen pixels. */
const MARGIN_PX = 60;

/** By how much the sheet moves on the screen so that a place is seen clear of the edges. */
export function panToSee(view: Viewport, at: SheetPx): [number, number] {
  const [x, y] = toScreen(view, at);
  return [into(x, view.widthPx), into(y, view.heightPx)];
}

function into(at: number, whole: number): number {
  const margin = Math.min(MARGIN_PX, whole / 4);
  return Math.min(whole - margin, Math.max(margin, at)) - at;
}

/** Where it comes up: where the pointer is or where it stood, if that is seen, else in the middle of the view. */
export function firstPlace(view: Viewport, ...wanted: readonly (SheetPx | null)[]): SheetPx {
  const seen = wanted.find((at) => at !== null && isSeen(view, at));
  return seen ?? toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2));
}

function isSeen(view: Viewport, at: SheetPx): boolean {
  const [x, y] = toScreen(view, at);
  return x >= 0 && y >= 0 && x <= view.widthPx && y <= view.heightPx;
}
