import { StaticCanvas } from 'fabric';
import type { SheetDto } from '#shared/contract/drawings.ts';
import type { Viewport } from '../model/viewport.ts';
import { createFabricScenes } from './fabric-sink.ts';
import { tileLoader } from './load-tile.ts';
import type { SceneItem } from './scene.ts';
import { paintTiles, wantedTiles } from './tile-painter.ts';
import { createTileStore, type TileStore } from './tile-store.ts';

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
 * Draws the sheet and what lies over it into two canvases of a host element: the tiles below, fabric above, both
 * under the same viewport. It draws only when something has changed and at most once a frame.
 */
export function createSheetRenderer(host: HTMLElement, sheet: SheetDto): SheetRenderer {
  const tileCanvas = host.ownerDocument.createElement('canvas');
  const fabricCanvas = host.ownerDocument.createElement('canvas');
  for (const canvas of [tileCanvas, fabricCanvas]) {
    canvas.setAttribute('aria-hidden', 'true');
    Object.assign(canvas.style, { position: 'absolute', inset: '0', width: '100%', height: '100%' });
    host.append(canvas);
  }
  const context = tileCanvas.getContext('2d', { alpha: false })!;
  const fabric = new StaticCanvas(fabricCanvas, { renderOnAddRemove: false, enableRetinaScaling: true });
  const scenes = createFabricScenes(fabric);
  const extraViews = new Map<string, () => void>();
  let view: Viewport | null = null;
  let scheduled = 0;
  let tilesDirty = false;
  let objectsDirty = false;
  let overlaid = false;

  const store: TileStore<ImageBitmap> = createTileStore({
    load: tileLoader(sheet),
    memoryLimitBytes: TILE_MEMORY_BYTES,
    concurrency: TILE_REQUESTS,
    onArrival() {
      tilesDirty = true;
      schedule();
      for (const paint of extraViews.values()) paint();
    },
  });

  function schedule(): void {
    if (scheduled === 0) scheduled = requestAnimationFrame(drawFrame);
  }

  function drawFrame(): void {
    scheduled = 0;
    if (view === null) return;
    if (tilesDirty) paintTiles(context, sheet, store, view, ratio());
    if (objectsDirty) fabric.renderAll();
    tilesDirty = false;
    objectsDirty = false;
  }

  function resize(next: Viewport): void {
    tileCanvas.width = Math.round(next.widthPx * ratio());
    tileCanvas.height = Math.round(next.heightPx * ratio());
    fabric.setDimensions({ width: next.widthPx, height: next.heightPx });
  }

  return {
    setView(next) {
      if (view === null || view.widthPx !== next.widthPx || view.heightPx !== next.heightPx) resize(next);
      view = next;
      const { zoom, origin } = next;
      fabric.setViewportTransform([zoom, 0, 0, zoom, -origin[0] * zoom, -origin[1] * zoom]);
      store.want('main', wantedTiles(sheet, next, ratio(), AHEAD_TILES));
      tilesDirty = true;
      objectsDirty = true;
      schedule();
    },
    showBase(items) {
      scenes.showBase(items);
      objectsDirty = true;
      schedule();
    },
    showOverlay(items) {
      if (items.length === 0 && !overlaid) return;
      overlaid = items.length > 0;
      scenes.showOverlay(items);
      objectsDirty = true;
      schedule();
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
      store.close();
      void fabric.dispose();
      tileCanvas.remove();
      fabricCanvas.remove();
    },
  };
}

function ratio(): number {
  return globalThis.devicePixelRatio || 1;
}
