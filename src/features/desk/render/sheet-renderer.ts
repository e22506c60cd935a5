import type { SheetDto } from '#shared/contract/drawings.ts';
import type { Viewport } from '../model/viewport.ts';
import { type LoadedTile, tileLoader } from './load-tile.ts';
import type { SceneItem } from './scene.ts';
import { createTileLayer } from './tile-layer.ts';
import { paintTiles, wantedTiles } from './tile-painter.ts';
import { createTileStore, type TileStore } from './tile-store.ts';
import { createTraceCanvas } from './trace-canvas.ts';

/** Decoded tiles kept: a screen of 4K needs about 60 MB of them. */
const TILE_MEMORY_BYTES = 160 * 1024 * 1024;
const TILE_REQUESTS = 4;
/** Tiles beyond the view's edge that are fetched ahead of a pan. */
const AHEAD_TILES = 1;

export type SheetRenderer = {
  setView(view: Viewport): void;
  showBase(items: readonly SceneItem[]): void;
  showOverlay(items: readonly SceneItem[]): void;
  /** A second, magnified view on the same tiles; `paint` is called again whenever a tile arrives. */
  addView(name: string, paint: () => void): { want(view: Viewport): void; end(): void };
  paintInto(context: CanvasRenderingContext2D, view: Viewport): void;
  /** True while a tile that is wanted is still on its way. */
  isWaiting(): boolean;
  destroy(): void;
};

/**
 * Shows the sheet and what lies over it in a host element: the tiles below, fabric above, both under the same
 * viewport. It draws only when something has changed and at most once a frame.
 */
export function createSheetRenderer(host: HTMLElement, sheet: SheetDto): SheetRenderer {
  const { fonts } = host.ownerDocument;
  const extraViews = new Map<string, () => void>();
  let view: Viewport | null = null;
  let scheduled = 0;
  let tilesDue = false;
  let tracesDue = false;
  let overlaid = false;

  const store: TileStore<LoadedTile> = createTileStore({
    load: tileLoader(sheet),
    memoryLimitBytes: TILE_MEMORY_BYTES,
    concurrency: TILE_REQUESTS,
    onArrival() {
      tilesDue = true;
      schedule();
      for (const paint of extraViews.values()) paint();
    },
  });
  const tiles = createTileLayer(host, sheet, store);
  const traces = createTraceCanvas(host);

  function schedule(): void {
    if (scheduled === 0) scheduled = requestAnimationFrame(drawFrame);
  }

  function drawFrame(): void {
    scheduled = 0;
    if (tilesDue) tiles.refresh();
    if (tracesDue) traces.draw();
    tilesDue = false;
    tracesDue = false;
  }

  function traceAgain(): void {
    tracesDue = true;
    schedule();
  }

  // A canvas takes a fallback font for one that is still loading, and does not draw again by itself.
  fonts.addEventListener('loadingdone', traceAgain);

  return {
    setView(next) {
      view = next;
      store.want('main', wantedTiles(sheet, next, ratio(), AHEAD_TILES));
      tiles.show(next);
      if (!traces.show(next)) traceAgain();
    },
    showBase(items) {
      traces.showBase(items);
      if (view !== null) traceAgain();
    },
    showOverlay(items) {
      // Without this a bare movement of the pointer would draw everything again.
      if (items.length === 0 && !overlaid) return;
      overlaid = items.length > 0;
      traces.showOverlay(items);
      traceAgain();
    },
    addView(name, paint) {
      extraViews.set(name, paint);
      return {
        want: (wanted) => store.want(name, wantedTiles(sheet, wanted, ratio(), 0)),
        end() {
          extraViews.delete(name);
          store.want(name, []);
        },
      };
    },
    paintInto: (target, shown) => paintTiles(target, sheet, store, shown, ratio()),
    isWaiting: () => store.isWaiting(),
    destroy() {
      cancelAnimationFrame(scheduled);
      fonts.removeEventListener('loadingdone', traceAgain);
      store.close();
      tiles.destroy();
      traces.destroy();
    },
  };
}

function ratio(): number {
  return globalThis.devicePixelRatio || 1;
}
