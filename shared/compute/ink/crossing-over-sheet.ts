import {
  crossingOfStrokes,
  STROKE_RADIUS,
  type StrokeCrossing,
} from '#shared/compute/ink/crossing-of-strokes.ts';
import type { InkSheet } from '#shared/compute/ink/follow-over-sheet.ts';

type Place = readonly [x: number, y: number];

/** Room about the pointer: the strokes looked at, and as much again of paper by which their ink is told. */
const ROOM = STROKE_RADIUS + 20;

/**
 * The crossing of two drawn straight lines that is nearest to a place of the sheet, sheet pixels; read from the scan at
 * its own size. Null where there is none within `reach` pixels, and beside the sheet. See `crossingOfStrokes`.
 */
export async function crossingOnSheet(
  sheet: InkSheet,
  [x, y]: Place,
  reach: number,
): Promise<StrokeCrossing | null> {
  if (x < 0 || y < 0 || x > sheet.widthPx || y > sheet.heightPx) return null;
  const left = Math.max(0, Math.floor(x) - ROOM);
  const top = Math.max(0, Math.floor(y) - ROOM);
  const width = Math.min(sheet.widthPx, Math.ceil(x) + ROOM) - left;
  const height = Math.min(sheet.heightPx, Math.ceil(y) + ROOM) - top;
  const window = await sheet.window(0, [left, top, width, height]);
  const found = crossingOfStrokes(window, [x - left, y - top], reach);
  return found === null ? null : { ...found, at: [found.at[0] + left, found.at[1] + top] };
}
