import type { SheetFrame, Viewport } from '../model/viewport.ts';
import { seenOfRaster } from '../model/viewport.ts';
import { layerTransform } from './layer-transform.ts';
import type { LoadedTile } from './load-tile.ts';
import { movedLayer } from './moved-layer.ts';
import { AS_SCANNED, paperColour, type ScanLook, scanFilter, veilColour } from './scan-look.ts';
import {
  levelFor,
  levelScale,
  type Tile,
  type TiledSheet,
  tileAbove,
  tileFrame,
  tileKey,
  tilesIn,
} from './tile-grid.ts';
import type { TileStore } from './tile-store.ts';

/** From here on each pixel of the scan is shown as a square: blurring it would hide where it ends. */
export const SQUARES_FROM_ZOOM = 4;
/** Over tiles of every level. */
const VEIL_Z = '100';

export type TileLayer = {
  /** Takes a view on; true when other tiles or other sizes are in sight than before. `zooming`: it is only scaled. */
  show(view: Viewport, zooming?: boolean): boolean;
  /** A tile has come in: what stood in for it can go. */
  refresh(): void;
  setLook(look: ScanLook): void;
  destroy(): void;
};

/**
 * Shows the sheet as tiles laid side by side in one layer that the browser moves as a whole. Panning then costs the
 * main thread one transform: painted into a canvas, the tiles took it 5 ms a frame with software rendering.
 */
export function createTileLayer(
  host: HTMLElement,
  sheet: TiledSheet,
  store: TileStore<LoadedTile>,
): TileLayer {
  const clip = host.ownerDocument.createElement('div');
  const paper = host.ownerDocument.createElement('div');
  clip.setAttribute('aria-hidden', 'true');
  Object.assign(clip.style, { position: 'absolute', inset: '0', overflow: 'hidden', contain: 'strict' });
  Object.assign(paper.style, { position: 'absolute', left: '0', top: '0', willChange: 'transform' });
  paper.style.transformOrigin = '0 0';
  paper.style.background = paperColour(AS_SCANNED);
  // Painted with the tiles into their one layer, so that a faded scan is panned as cheaply as another.
  const veil = host.ownerDocument.createElement('div');
  Object.assign(veil.style, { position: 'absolute', inset: '0', zIndex: VEIL_Z, display: 'none' });
  paper.append(veil);
  clip.append(paper);
  host.append(clip);
  const moveTo = movedLayer(paper);
  let view: Viewport | null = null;
  let look = AS_SCANNED;
  let laidOut = '';
  let laidOutAt = 1;
  let shown = new Map<string, HTMLImageElement>();

  /** Puts into the layer what the view needs, finer tiles over the coarser ones that stand in. */
  function layOut(): void {
    if (view === null) return;
    if (view.zoom !== laidOutAt) {
      // Under way to another zoom, which lays them out anew once it rests.
      laidOut = '';
      return;
    }
    const next = new Map<string, HTMLImageElement>();
    const ratio = devicePixelRatioNow();
    for (const tile of tilesToShow(sheet, store, view, ratio)) {
      const picture = store.get(tile);
      if (picture === null) continue;
      next.set(tileKey(tile), picture.image);
      picture.image.style.filter = scanFilter(look);
      place(picture.image, boxOf(sheet, tile, picture), view.zoom, ratio, tile.z);
    }
    for (const [key, image] of shown) if (next.get(key) !== image) image.remove();
    for (const [key, image] of next) if (shown.get(key) !== image) paper.append(image);
    shown = next;
    const [width, height] = onDevice([sheet.widthPx, sheet.heightPx], view.zoom, ratio);
    paper.style.width = `${width}px`;
    paper.style.height = `${height}px`;
    paper.style.imageRendering = view.zoom * ratio >= SQUARES_FROM_ZOOM ? 'pixelated' : 'auto';
  }

  return {
    show(next, zooming = false) {
      view = next;
      // Laying the tiles out at another zoom costs tens of milliseconds with software rendering, scaling them nothing.
      if (!zooming) laidOutAt = next.zoom;
      moveTo(layerTransform(next, sheet, devicePixelRatioNow(), laidOutAt));
      if (zooming) return false;
      const key = layoutKey(sheet, next);
      if (key === laidOut) return false;
      laidOut = key;
      layOut();
      return true;
    },
    refresh: layOut,
    setLook(next) {
      look = next;
      paper.style.background = paperColour(look);
      veil.style.display = look.faded > 0 ? '' : 'none';
      veil.style.background = veilColour(look);
      veil.style.opacity = String(look.faded);
      layOut();
    },
    destroy: () => clip.remove(),
  };
}

/** Names the tiles in sight and their size: while it is the same, moving the layer is all there is to do. */
function layoutKey(sheet: TiledSheet, view: Viewport): string {
  const z = levelFor(sheet, view.zoom * devicePixelRatioNow());
  const side = sheet.tiles.tileSizePx / levelScale(sheet, z);
  const [left, top, width, height] = seenOfRaster(view, sheet);
  const range = [left, top, left + width, top + height].map((edge) => Math.floor(edge / side));
  return `${view.zoom} ${z} ${range.join(' ')} ${view.widthPx} ${view.heightPx}`;
}

/** Tiles in sight that are there; for each that is not, the nearest coarser one. Coarse ones first. */
function tilesToShow(sheet: TiledSheet, store: TileStore<LoadedTile>, view: Viewport, ratio: number): Tile[] {
  const found = new Map<string, Tile>();
  for (const tile of tilesIn(sheet, levelFor(sheet, view.zoom * ratio), seenOfRaster(view, sheet))) {
    for (let z = tile.z; z >= 0; z -= 1) {
      const candidate = tileAbove(tile, z);
      if (store.get(candidate) === null) continue;
      found.set(tileKey(candidate), candidate);
      break;
    }
  }
  return [...found.values()].sort((a, b) => a.z - b.z);
}

/** What a tile really shows: the last ones of a row or column are cut at the sheet's edge. */
function boxOf(sheet: TiledSheet, tile: Tile, picture: LoadedTile): SheetFrame {
  const scale = levelScale(sheet, tile.z);
  const [left, top] = tileFrame(sheet, tile);
  return [left, top, picture.width / scale, picture.height / scale];
}

/** Edges on whole device pixels, so that no seam shows between neighbours. */
function place(image: HTMLImageElement, box: SheetFrame, zoom: number, ratio: number, z: number): void {
  const [left, top] = onDevice([box[0], box[1]], zoom, ratio);
  const [right, bottom] = onDevice([box[0] + box[2], box[1] + box[3]], zoom, ratio);
  const { style } = image;
  style.left = `${left}px`;
  style.top = `${top}px`;
  style.width = `${right - left}px`;
  style.height = `${bottom - top}px`;
  style.zIndex = String(z);
}

function onDevice([x, y]: readonly [number, number], zoom: number, ratio: number): [number, number] {
  return [Math.round(x * zoom * ratio) / ratio, Math.round(y * zoom * ratio) / ratio];
}

function devicePixelRatioNow(): number {
  return globalThis.devicePixelRatio || 1;
}
