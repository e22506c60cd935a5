import type { SheetPx } from '#shared/compute/frames.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { Viewport } from '../model/viewport.ts';
import { paintMagnified } from './magnified.ts';
import { onceAFrame } from './once-a-frame.ts';
import type { SheetRenderer } from './sheet-renderer.ts';

export type MagnifiedView = {
  readonly canvas: HTMLCanvasElement;
  readonly renderer: SheetRenderer;
  readonly store: DeskStore;
  /** Place in the middle; null while there is none. */
  centre(): SheetPx | null;
  viewAround(at: SheetPx): Viewport;
  onPainted(at: SheetPx): void;
};

/**
 * Paints a magnified view at once and again when the net, a tile or, told by `moved`, its middle changes: in the next
 * frame and once in it, however much has changed.
 */
export function keepMagnified(shown: MagnifiedView): { moved(): void; end(): void } {
  const { canvas, renderer, store } = shown;
  const { due, end } = onceAFrame(paint);
  const extra = renderer.addView('magnifier', due);

  function paint(): void {
    const at = shown.centre();
    if (at === null) return;
    const view = shown.viewAround(at);
    extra.want(view);
    paintMagnified(canvas, renderer, view, store.getState());
    shown.onPainted(at);
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
