import { drawAnew } from './drawing-surface.ts';
import { paintWordsBlock, type WordsLook } from './words-block.ts';

export type WordCanvas = {
  /** Takes a look and so much room, screen pixels. */
  dress(look: WordsLook, widthPx: number, heightPx: number): void;
  /** Shows rows of words, from the left edge or from the right one. */
  show(rows: readonly string[], side?: 'left' | 'right'): void;
};

type Dress = { readonly look: WordsLook; readonly width: number; readonly height: number };

/**
 * Shows words that follow the pointer in a canvas, and keeps them as its text for whoever does not see it. As text of the
 * page they would have it laid out and painted anew in every frame, which takes 1 to 2 ms with software rendering.
 */
export function wordCanvas(canvas: HTMLCanvasElement): WordCanvas {
  let dress: Dress | null = null;
  let shown: readonly string[] = [];
  let from: 'left' | 'right' = 'left';

  function paint(): void {
    if (dress === null) return;
    const { look, width, height } = dress;
    const place = { x: from === 'left' ? 0 : width, y: 0, side: from, roomPx: width };
    drawAnew(canvas, { width, height }, (context) => paintWordsBlock(context, shown, place, look));
  }

  return {
    dress(look, width, height) {
      dress = { look, width, height };
      paint();
    },
    show(rows, side = 'left') {
      if (side === from && sameRows(rows, shown)) return;
      shown = rows;
      from = side;
      tell(canvas, rows);
      paint();
    },
  };
}

/** The words as the text of their canvas, which is there for screen readers and is not shown. */
export function tell(canvas: HTMLCanvasElement, rows: readonly string[]): void {
  const text = rows.join('\n');
  if (!(canvas.firstChild instanceof Text)) canvas.append('');
  if (canvas.firstChild instanceof Text && canvas.firstChild.data !== text) canvas.firstChild.data = text;
}

function sameRows(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((row, i) => row === b[i]);
}
