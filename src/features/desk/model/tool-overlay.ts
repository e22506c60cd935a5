import type { SheetPx } from '#shared/compute/frames.ts';

/** What a place near existing lines snaps to. */
export type Snap = {
  readonly kind: 'end' | 'vertex' | 'line';
  readonly at: SheetPx;
  readonly lineId: string;
};

/** What the tool in hand shows under the pointer before anything is pressed. */
export type ToolOverlay = {
  /** From the end of the line under way to where its next point would go. */
  readonly rubber: readonly [SheetPx, SheetPx] | null;
  readonly snap: Snap | null;
  /** True where places should be set finer than the view shows. */
  readonly magnify: boolean;
};

export const NO_OVERLAY: ToolOverlay = { rubber: null, snap: null, magnify: false };
