import type { SheetDto } from '#shared/contract/drawings.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import type { Viewport } from '../model/viewport.ts';
import { type LoadedTile, tileLoader } from './load-tile.ts';
import { onceAFrame } from './once-a-frame.ts';
import { AS_SCANNED, paintWithLook, type ScanLook } from './scan-look.ts';
import type { SceneItem } from './scene.ts';
import { createTileLayer } from './tile-layer.ts';
import { paintTiles, wantedTiles } from './tile-painter.ts';
import { createTileStore, type TileStore } from './tile-store.ts';
import { createTraceCanvas } from './trace-canvas.ts';

/**
 * Decoded tiles kept, a little more than a screen of 4K needs; those in sight stay in any case. The browser keeps pictures
 * of its own of what is in the page, so that more of them costs the page twice.
 */
const TILE_MEMORY_BYTES = 80 * 1024 * 1024;
const TILE_REQUESTS = 4;
/** Tiles beyond the view's edge that are fetched ahead of a pan. */
const AHEAD_TILES = 1;

/** Device pixels drawn beyond the view's edges: a drag by a hand's width then draws nothing, and drawing stays one short task. */
const MARGIN_DEVICE_PX = 320;
/** After a pan has rested for so long, what is drawn is centred again for the next one. */
const PAN_REST_MS = 250;
/** After a zoom has rested for so long, what was only scaled is drawn at its size; so often while it goes on. */
const ZOOM_REST_MS = 120;
const ZOOM_LASTS_MS = 480;
/** A change of zoom by no more than this is a step of a wheel, a pinch or a button, and more are likely to follow. */
const ZOOM_STEP = 1.5;

export type SheetRenderer = {
  readonly raster: SheetRaster;
  setView(view: Viewport): void;
  /** What rests: everything but what is being worked on. */
  showBase(items: readonly SceneItem[]): void;
  /** What is being worked on: the chosen line, its handles, the band to the pointer. */
  showActive(items: readonly SceneItem[]): void;
  /** Finer tiles of the sheet have been made. */
  sharpen(tiles: SheetDto['tiles']): void;
  /** How the scan is shown; the traces over it stay as they are. */
  setScanLook(look: ScanLook): void;
  /** A second, magnified view on the same tiles; `paint` is called again whenever a tile arrives. */
  addView(name: string, paint: () => void): { want(view: Viewport): void; end(): void };
  paintInto(context: CanvasRenderingContext2D, view: Viewport): void;
  /** True while a tile that is wanted is still on its way. */
  isWaiting(): boolean;
  destroy(): void;
};

/**
 * Shows the sheet and what lies over it in a host element: the tiles below, traces above, both under the same
 * viewport. It draws only when something has changed and at most once a frame. While the view is being zoomed, what is
 * there is scaled, because drawing it at each step takes longer than a frame; `onZoom` is called when it is about to be drawn
 * at its size again, for whatever depends on the zoom.
 */
export function createSheetRenderer(
  host: HTMLElement,
  opened: SheetRaster,
  onZoom: () => void = () => {},
): SheetRenderer {
  // A copy, whose tiles become finer while the sheet is being prepared.
  const sheet = { ...opened };
  const { fonts } = host.ownerDocument;
  const extraViews = new Map<string, () => void>();
  let view: Viewport | null = null;
  let tilesDue = false;
  let baseDue = false;
  let activeDue = false;
  let look = AS_SCANNED;
  let restTimer: ReturnType<typeof setTimeout> | undefined;
  /** When the steps of zooming began that are going on; null while none are. */
  let zoomingSince: number | null = null;

  const store: TileStore<LoadedTile> = createTileStore({
    load: tileLoader(sheet),
    memoryLimitBytes: TILE_MEMORY_BYTES,
    concurrency: TILE_REQUESTS,
    onArrival() {
      tilesDue = true;
      frame.due();
      for (const paint of extraViews.values()) paint();
    },
  });
  const tiles = createTileLayer(host, sheet, store);
  const marginPx = Math.round(MARGIN_DEVICE_PX / ratio());
  const base = createTraceCanvas(host, { kind: 'ahead', marginPx });
  const active = createTraceCanvas(host, { kind: 'close' });

  const frame = onceAFrame(drawFrame);

  function drawFrame(): void {
    if (tilesDue) tiles.refresh();
    if (baseDue) base.draw();
    if (activeDue) active.draw();
    tilesDue = false;
    baseDue = false;
    activeDue = false;
  }

  function due(baseChanged: boolean, activeChanged: boolean): void {
    baseDue ||= baseChanged;
    activeDue ||= activeChanged;
    if (view !== null && (baseDue || activeDue)) frame.due();
  }

  const drawTexts = () => due(true, true);

  function drawAtRest(): void {
    clearTimeout(restTimer);
    if (zoomingSince !== null) {
      const left = zoomingSince + ZOOM_LASTS_MS - performance.now();
      restTimer = setTimeout(endZoom, Math.max(0, Math.min(ZOOM_REST_MS, left)));
    } else if (base.isOffCentre()) restTimer = setTimeout(() => due(true, false), PAN_REST_MS);
  }

  function endZoom(): void {
    zoomingSince = null;
    onZoom();
    if (view === null) return;
    layOutTiles(view, false);
    due(base.isOffCentre(), active.isOffCentre());
  }

  function layOutTiles(next: Viewport, zooming: boolean): void {
    if (tiles.show(next, zooming)) store.want('main', wantedTiles(sheet, next, ratio(), AHEAD_TILES));
  }

  /** True while steps of zooming follow one another; a leap, as to the whole sheet, is drawn at once. */
  function isZooming(next: Viewport): boolean {
    if (view === null || view.widthPx !== next.widthPx || view.heightPx !== next.heightPx) return false;
    if (view.seenAs !== next.seenAs) return false;
    const step = next.zoom / view.zoom;
    return step === 1 ? zoomingSince !== null : step <= ZOOM_STEP && step >= 1 / ZOOM_STEP;
  }

  // A canvas takes a fallback font for one that is still loading, and does not draw again by itself.
  fonts.addEventListener('loadingdone', drawTexts);

  function setView(next: Viewport): void {
    const zooming = isZooming(next);
    const leaps = !zooming && view !== null && view.zoom !== next.zoom;
    zoomingSince = zooming ? (zoomingSince ?? performance.now()) : null;
    view = next;
    layOutTiles(next, zooming);
    due(base.show(next, zooming), active.show(next, zooming));
    drawAtRest();
    if (leaps) onZoom();
  }

  return {
    raster: opened,
    setView,
    sharpen(finer) {
      sheet.tiles = finer;
      if (view !== null) setView(view);
    },
    showBase: (items) => due(base.showItems(items), false),
    showActive: (items) => due(false, active.showItems(items)),
    setScanLook(next) {
      if (next.faded === look.faded && next.inverted === look.inverted) return;
      look = next;
      tiles.setLook(next);
      for (const paint of extraViews.values()) paint();
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
    paintInto: (target, shown) =>
      paintWithLook(target, look, () => paintTiles(target, sheet, store, shown, ratio())),
    isWaiting: () => store.isWaiting(),
    destroy() {
      frame.end();
      clearTimeout(restTimer);
      fonts.removeEventListener('loadingdone', drawTexts);
      store.close();
      tiles.destroy();
      base.destroy();
      active.destroy();
    },
  };
}

function ratio(): number {
  return globalThis.devicePixelRatio || 1;
}
