import type { SheetPx } from '#shared/compute/frames.ts';
import type { Modifiers, ToolContext } from './tool-types.ts';

/** How far from the pointer a crossing may be, screen pixels, and its bounds in pixels of the sheet. */
const REACH_PX = 12;
const REACH_ON_SHEET = [6, 24] as const;

/** How far from a place on the sheet a crossing of drawn lines may be to be meant, sheet pixels. */
export function crossingReach({ zoom }: Pick<ToolContext, 'zoom'>): number {
  return Math.min(REACH_ON_SHEET[1], Math.max(REACH_ON_SHEET[0], REACH_PX / zoom));
}

/**
 * The crossing of two lines of the scan that a place near it goes to; null where none has been found yet, where Alt or
 * Ctrl is held, and where the aid is switched off.
 */
export function drawnCrossingAt(at: SheetPx, keys: Modifiers, context: ToolContext): SheetPx | null {
  const crossing = context.crossingLook?.at ?? null;
  if (crossing === null || keys.alt || keys.ctrl) return null;
  return Math.hypot(crossing[0] - at[0], crossing[1] - at[1]) <= crossingReach(context) ? crossing : null;
}

/** True when the newest look was at this very place, so that nothing more is to be known about it. */
export function isLookedAt(at: SheetPx, { crossingLook, zoom }: ToolContext): boolean {
  if (crossingLook === null) return false;
  const { about } = crossingLook;
  return Math.hypot(about[0] - at[0], about[1] - at[1]) * zoom < 1;
}
