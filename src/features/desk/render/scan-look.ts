import { COLOURS } from './line-look.ts';

/** How the scan is shown on this screen: faded towards its paper by a part of one, and with light and dark exchanged. */
export type ScanLook = { readonly faded: number; readonly inverted: boolean };

export const AS_SCANNED: ScanLook = { faded: 0, inverted: false };

const EMPTY_SHEET_COLOUR = '#f1eee4';
const INVERTED_SHEET_COLOUR = '#0e111b';

/** Colour of the sheet where no tile is there yet. */
export function paperColour({ inverted }: ScanLook): string {
  return inverted ? INVERTED_SHEET_COLOUR : EMPTY_SHEET_COLOUR;
}

/** What lies over the scan to fade it. */
export function veilColour({ inverted }: ScanLook): string {
  return inverted ? COLOURS.ink : COLOURS.film;
}

/** A filter of CSS and of canvases alike. */
export function scanFilter({ inverted }: ScanLook): string {
  return inverted ? 'invert(1)' : 'none';
}

/** Paints a scan into a canvas with a look, over all of it. */
export function paintWithLook(context: CanvasRenderingContext2D, look: ScanLook, paint: () => void): void {
  // To set a filter takes milliseconds, also to set that there is none.
  if (look.inverted) context.filter = scanFilter(look);
  paint();
  if (look.inverted) context.filter = 'none';
  if (look.faded === 0) return;
  context.save();
  context.setTransform(1, 0, 0, 1, 0, 0);
  context.globalAlpha = look.faded;
  context.fillStyle = veilColour(look);
  context.fillRect(0, 0, context.canvas.width, context.canvas.height);
  context.restore();
}
