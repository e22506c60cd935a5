import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { ToolContext } from './tool-types.ts';

const STEP = Math.PI / 4;

/**
 * The place nearest to `to` on a ray from `from` that is level, plumb or at 45° in the section; before the section is
 * set out, on the sheet.
 */
export function constrained(context: ToolContext, from: SheetPx, to: SheetPx): SheetPx {
  const up = context.map?.up ?? [0, -1];
  const base = Math.atan2(up[1], up[0]);
  const dx = to[0] - from[0];
  const dy = to[1] - from[1];
  const angle = base + Math.round((Math.atan2(dy, dx) - base) / STEP) * STEP;
  const length = dx * Math.cos(angle) + dy * Math.sin(angle);
  return sheetPx(from[0] + length * Math.cos(angle), from[1] + length * Math.sin(angle));
}
