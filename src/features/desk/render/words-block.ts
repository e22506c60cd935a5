import { COLOURS } from './line-look.ts';

/** How rows of words stand on their ground. Screen pixels. */
export type WordsLook = {
  readonly font: string;
  /** From row to row. */
  readonly linePx: number;
  /** About the words: across, and above and below. */
  readonly paddingPx: readonly [number, number];
  /** How much of what is under it the ground hides, 0 to 1. */
  readonly groundAlpha: number;
  /** With a thin edge about the ground. */
  readonly edged: boolean;
  /** Stands between the rows where all of them find room in one; null = they never share one. */
  readonly gap: string | null;
};

/** The rule about the panels over the sheet. */
const EDGE = '#b9c3c2';

/** The font that its class gives an element, as a canvas takes it, and its size in screen pixels. */
export function fontOf(element: Element): { readonly font: string; readonly sizePx: number } {
  const { fontWeight, fontSize, fontFamily } = getComputedStyle(element);
  return { font: `${fontWeight} ${fontSize} ${fontFamily}`, sizePx: Number.parseFloat(fontSize) };
}

/** Where a block stands: at this place with its upper left or, `side` right, its upper right corner; with so much room. */
export type BlockPlace = {
  readonly x: number;
  readonly y: number;
  readonly side: 'left' | 'right';
  readonly roomPx: number;
};

/** How high a block of rows is. */
export function blockHeightPx(rows: number, { linePx, paddingPx: [, down] }: WordsLook): number {
  return rows * linePx + 2 * down;
}

/** Paints rows of words on a ground as wide as the widest of them; one that is too long for the room is set closer. */
export function paintWordsBlock(
  context: CanvasRenderingContext2D,
  words: readonly string[],
  { x, y, side, roomPx }: BlockPlace,
  look: WordsLook,
): void {
  if (words.length === 0) return;
  const [across, down] = look.paddingPx;
  context.font = look.font;
  const widthOf = (text: string) => textWidthPx(context, text) + 2 * across;
  const oneRow = look.gap === null ? null : words.join(look.gap);
  const rows = oneRow !== null && widthOf(oneRow) <= roomPx ? [oneRow] : words;
  const wishedPx = Math.max(...rows.map(widthOf));
  const widthPx = Math.min(roomPx, wishedPx);
  const heightPx = blockHeightPx(rows.length, look);
  const left = side === 'left' ? x : x - widthPx;
  context.globalAlpha = look.groundAlpha;
  context.fillStyle = COLOURS.film;
  context.fillRect(left, y, widthPx, heightPx);
  context.globalAlpha = 1;
  if (look.edged) {
    context.strokeStyle = EDGE;
    context.lineWidth = 1;
    context.strokeRect(left + 0.5, y + 0.5, widthPx - 1, heightPx - 1);
  }
  context.fillStyle = COLOURS.ink;
  context.textAlign = 'left';
  context.textBaseline = 'middle';
  rows.forEach((row, i) => {
    const [from, middle] = [left + across, y + down + (i + 0.5) * look.linePx];
    if (wishedPx <= roomPx) context.fillText(row, from, middle);
    else context.fillText(row, from, middle, roomPx - 2 * across);
  });
}

const letterWidths = new Map<string, Map<string, number>>();

/**
 * The width of a text as the sum of its letters', in the context's font: a ground need not be exact to a fraction of a
 * pixel, and measuring words that differ in every frame takes half as long as all the rest.
 */
function textWidthPx(context: CanvasRenderingContext2D, text: string): number {
  const known = letterWidths.get(context.font) ?? new Map<string, number>();
  letterWidths.set(context.font, known);
  let sum = 0;
  for (const letter of text) {
    const width = known.get(letter) ?? context.measureText(letter).width;
    known.set(letter, width);
    sum += width;
  }
  return Math.ceil(sum);
}
