import { placingText as text } from '#client/text/set-out.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';

/** Across the sheet and down it. */
export type SheetAxis = 0 | 1;

/** The place with one of its two figures typed, px. */
export function withTyped(at: SheetPoint, axis: SheetAxis, px: number): SheetPoint {
  return axis === 0 ? [px, at[1]] : [at[0], px];
}

/** What can be typed for a mark on the drawing: a place of the sheet, with the sentence that refuses any other. */
export function extentOf({ widthPx, heightPx }: FlowNetDocument['sheet'], axis: SheetAxis) {
  const greatest = axis === 0 ? widthPx : heightPx;
  return { least: 0, greatest, fault: text.offSheet(greatest) };
}
