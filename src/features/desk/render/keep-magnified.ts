import type { SheetPx } from '#shared/compute/frames.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { Viewport } from '../model/viewport.ts';
import { paintMagnified } from './magnified.ts';
import { onceAFrame } from './once-a-frame.ts';
import type { SheetRenderer } from './sheet-renderer.ts';
import { tell } from './word-canvas.ts';
import { fontOf, paintWordsBlock } from './words-block.ts';

export type MagnifiedView = {
  readonly canvas: HTMLCanvasElement;
  readonly renderer: SheetRenderer;
  readonly store: DeskStore;
  /** Place in the middle; null while there is none. */
  centre(): SheetPx | null;
  viewAround(at: SheetPx): Viewport;
  /** What is said of the place in the middle. */
  words(at: SheetPx): string;
};

/**
 * Paints a magnified view at once and again when the net, a tile or, told by `moved`, its middle changes: once in a
 * frame, however much has changed.
 */
export function keepMagnified(shown: MagnifiedView): { moved(): void; end(): void } {
  const { canvas, renderer, store } = shown;
  const { due, end } = onceAFrame(paint, 'magnified');
  const { font, sizePx } = fontOf(canvas);
  const look = {
    font,
    linePx: Math.round(1.4 * sizePx),
    paddingPx: [4, 0],
    groundAlpha: 1,
    edged: false,
    gap: null,
  } as const;
  const extra = renderer.addView('magnifier', due);

  function paint(): void {
    const at = shown.centre();
    if (at === null) return;
    const view = shown.viewAround(at);
    extra.want(view);
    paintMagnified(canvas, renderer, view, store.getState());
    const words = [shown.words(at)];
    const context = canvas.getContext('2d');
    if (context === null) return;
    paintWordsBlock(context, words, { x: 4, y: 2, side: 'left', roomPx: view.widthPx }, look);
    tell(canvas, words);
  }

  const endStore = store.subscribe(({ document, preview }, before) => {
    if (document !== before.document || preview !== before.preview) due();
  });
  paint();
  return {
    moved: due,
    end() {
      end();
      endStore();
      extra.end();
    },
  };
}
