import { createPngWriter } from '#client/lib/png-writer.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { PicturePage } from '../model/picture-page.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import { rasterMap, type Viewport } from '../model/viewport.ts';
import { createFabricScene, type FabricScene } from './fabric-scene.ts';
import { type LoadedTile, tileLoader } from './load-tile.ts';
import { PX_PER_MM, paintWords } from './picture-words.ts';
import { paintWithLook, type ScanLook } from './scan-look.ts';
import type { SceneItem } from './scene.ts';
import { type Tile, tileKey } from './tile-grid.ts';
import { paintTiles, wantedTiles } from './tile-painter.ts';
import { paintTilesThrough } from './tiles-through.ts';

/** Rows painted at once, device pixels: the widest picture then takes some 12 MB. */
const BAND_PX = 256;
/** Tiles fetched at once. */
const REQUESTS = 6;

export type PictureJob = {
  /** What the sheet is shown by. */
  readonly raster: SheetRaster;
  readonly page: PicturePage;
  /** Pixels of the picture for each screen pixel, of which there are 96 to an inch. */
  readonly ratio: number;
  /** The drawing's box as a view of the sheet, in screen pixels. */
  readonly view: Viewport;
  readonly look: ScanLook;
  readonly scene: readonly SceneItem[];
  /** Samples of the legend, in screen pixels from the page's corner. */
  readonly legend: readonly SceneItem[];
};

/** Size of the picture in pixels. */
export function pictureSize({ page, ratio }: Pick<PictureJob, 'page' | 'ratio'>): {
  readonly widthPx: number;
  readonly heightPx: number;
} {
  const px = (mm: number) => Math.round(mm * PX_PER_MM * ratio);
  return { widthPx: px(page.widthMm), heightPx: px(page.heightMm) };
}

/**
 * Paints a page with the desk's own tiles, lines and labels and writes it as a PNG, band by band, so that no more of
 * it than a band and the compressed file is held. Throws when a tile cannot be had or `signal` aborts.
 */
export async function paintPicture(
  job: PictureJob,
  signal: AbortSignal,
  onProgress: (share: number) => void,
): Promise<Blob> {
  const { widthPx, heightPx } = pictureSize(job);
  const png = createPngWriter(widthPx, heightPx, 96 * job.ratio);
  const scene = createFabricScene();
  const legend = createFabricScene();
  scene.show(job.scene);
  legend.show(job.legend);
  const whole = { x: 0, y: 0, width: widthPx / job.ratio, height: heightPx / job.ratio };
  const tiles = createBandTiles(job.raster, signal);
  try {
    for (let top = 0; top < heightPx; top += BAND_PX) {
      signal.throwIfAborted();
      const rows = Math.min(BAND_PX, heightPx - top);
      const context = contextOf(widthPx, rows);
      await paintScan(context, job, tiles, top, rows);
      context.setTransform(job.ratio, 0, 0, job.ratio, 0, -top);
      paintDrawing(context, job, scene);
      legend.paint(context, { zoom: 1, origin: sheetPx(0, 0) }, whole);
      paintWords(context, job.page);
      await png.rows(context.getImageData(0, 0, widthPx, rows).data);
      onProgress(Math.min(1, (top + rows) / heightPx));
    }
    return await png.end();
  } catch (error) {
    png.abort();
    throw error;
  } finally {
    tiles.clear();
    scene.end();
    legend.end();
  }
}

function contextOf(widthPx: number, heightPx: number): CanvasRenderingContext2D {
  const canvas = document.createElement('canvas');
  canvas.width = widthPx;
  canvas.height = heightPx;
  const context = canvas.getContext('2d', { alpha: false, willReadFrequently: true });
  if (context === null) throw new Error('The browser gives no canvas of this size.');
  context.textRendering = 'geometricPrecision';
  context.fillStyle = '#ffffff';
  context.fillRect(0, 0, widthPx, heightPx);
  return context;
}

/** The rows of the scan that lie in a band. */
async function paintScan(
  page: CanvasRenderingContext2D,
  { raster, page: { drawing }, ratio, view, look }: PictureJob,
  tiles: BandTiles,
  bandTop: number,
  bandRows: number,
): Promise<void> {
  const px = (mm: number) => Math.round(mm * PX_PER_MM * ratio);
  const [left, top] = [px(drawing.x), px(drawing.y)];
  const [width, height] = [px(drawing.width), px(drawing.height)];
  const from = Math.max(bandTop, top);
  const to = Math.min(bandTop + bandRows, top + height);
  if (to <= from) return;
  const origin = sheetPx(view.origin[0], view.origin[1] + (from - top) / ratio / view.zoom);
  const part: Viewport = { ...view, origin, widthPx: width / ratio, heightPx: (to - from) / ratio };
  const store = await tiles.of(wantedTiles(raster, part, ratio, 0));
  const scan = contextOf(width, to - from);
  paintWithLook(scan, look, () =>
    rasterMap(part, raster) === null
      ? paintTiles(scan, raster, store, part, ratio)
      : paintTilesThrough(scan, raster, store, part, ratio),
  );
  page.drawImage(scan.canvas, left, from - bandTop);
}

function paintDrawing(
  context: CanvasRenderingContext2D,
  { page: { drawing }, view }: PictureJob,
  scene: FabricScene,
): void {
  const [x, y] = [drawing.x * PX_PER_MM, drawing.y * PX_PER_MM];
  context.save();
  context.beginPath();
  context.rect(x, y, drawing.width * PX_PER_MM, drawing.height * PX_PER_MM);
  context.clip();
  context.translate(x, y);
  scene.paint(context, view, { x: 0, y: 0, width: view.widthPx, height: view.heightPx });
  context.restore();
}

type BandTiles = {
  /** Fetches what a band needs and lets go of what only the band before needed. */
  of(wanted: readonly Tile[]): Promise<{ get(tile: Tile): LoadedTile | null }>;
  clear(): void;
};

function createBandTiles(raster: SheetRaster, signal: AbortSignal): BandTiles {
  const load = tileLoader(raster);
  let held = new Map<string, LoadedTile>();
  return {
    async of(wanted) {
      const next = new Map<string, LoadedTile>();
      const missing = wanted.filter((tile) => {
        const key = tileKey(tile);
        const picture = held.get(key);
        if (picture !== undefined) next.set(key, picture);
        return picture === undefined;
      });
      for (const [key, picture] of held) if (!next.has(key)) picture.close();
      held = next;
      const fetchNext = async (): Promise<void> => {
        for (let tile = missing.shift(); tile !== undefined; tile = missing.shift())
          held.set(tileKey(tile), await load(tile, signal));
      };
      await Promise.all(Array.from({ length: REQUESTS }, fetchNext));
      return { get: (tile) => held.get(tileKey(tile)) ?? null };
    },
    clear() {
      for (const picture of held.values()) picture.close();
      held.clear();
    },
  };
}
