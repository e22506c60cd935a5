import { buffer } from 'node:stream/consumers';
import sharp from 'sharp';
import type { SheetEntity } from '#server/entities/drawing-entity.ts';
import { tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import type { StoragePort } from '#server/storage/storage-port.ts';

export type TiledSheet = Pick<
  SheetEntity,
  'id' | 'rendition' | 'tileSizePx' | 'maxZoom' | 'readyZoom' | 'tileFormat' | 'widthPx' | 'heightPx'
>;

/** Dots per inch on paper beyond which a print does not get better. */
const PRINT_DPI = 300;
const PT_PER_INCH = 72;
const QUALITIES = [78, 62, 46, 30];
/** Leaves room for fonts, text and traces below 5 MB. */
const MOST_BYTES = 4_200_000;

/** The part of the sheet that is printed, `[left, top, width, height]` in base-raster pixels, and its size on paper. */
export interface PrintedPart {
  crop: readonly [number, number, number, number];
  widthPt: number;
}

/**
 * The scan below the traces as a grey JPEG of at most 300 dots per inch on paper, put together from the tiles of the
 * coarsest level that reaches it. Grey, so that coloured traces stand out from it. The same tiles give the same bytes.
 * @throws StorageError `missing` when a tile is not there
 */
export async function scanPicture(
  storage: StoragePort,
  sheet: TiledSheet,
  { crop, widthPt }: PrintedPart,
  signal: AbortSignal,
): Promise<Buffer> {
  const wantedPx = Math.max(1, Math.round((widthPt / PT_PER_INCH) * PRINT_DPI));
  return compressed(await scanRaster(storage, sheet, { crop, wantedPx }, signal));
}

/**
 * A part of the scan in grey, at most `wantedPx` wide, from the coarsest level that reaches it.
 * @throws StorageError `missing` when a tile is not there
 */
export async function scanRaster(
  storage: StoragePort,
  sheet: TiledSheet,
  { crop, wantedPx }: { crop: PrintedPart['crop']; wantedPx: number },
  signal: AbortSignal,
): Promise<GreyRaster> {
  // Of a sheet whose rest is being drawn, or could not be, there are coarse levels only.
  const zoom = Math.min(zoomFor(sheet.maxZoom, crop[2], wantedPx), sheet.readyZoom ?? sheet.maxZoom);
  const raster = await rasterOf(storage, sheet, crop, zoom, signal);
  const image = sharp(raster.data, { raw: { width: raster.width, height: raster.height, channels: 1 } });
  if (raster.width > wantedPx) image.resize({ width: wantedPx });
  const { data, info } = await image.toColourspace('b-w').raw().toBuffer({ resolveWithObject: true });
  return { data, width: info.width, height: info.height };
}

/** The coarsest level at which the part has as many pixels as are wanted; the finest where none has. */
export function zoomFor(maxZoom: number, cropWidthPx: number, wantedPx: number): number {
  for (let zoom = 0; zoom < maxZoom; zoom += 1)
    if (cropWidthPx / 2 ** (maxZoom - zoom) >= wantedPx) return zoom;
  return maxZoom;
}

/** One byte a pixel, row by row. */
export interface GreyRaster {
  data: Buffer;
  width: number;
  height: number;
}

async function rasterOf(
  storage: StoragePort,
  sheet: TiledSheet,
  crop: PrintedPart['crop'],
  zoom: number,
  signal: AbortSignal,
): Promise<GreyRaster> {
  const shrink = 2 ** (sheet.maxZoom - zoom);
  const [left, top, width, height] = crop.map((length) => Math.round(length / shrink)) as [
    number,
    number,
    number,
    number,
  ];
  const raster = {
    data: Buffer.alloc(width * height, 255),
    width: Math.max(1, width),
    height: Math.max(1, height),
  };
  const size = sheet.tileSizePx;
  const prefix = tilePrefix(sheet.id, sheet.rendition);
  const [right, bottom] = [
    Math.min(left + width, Math.ceil(sheet.widthPx / shrink)),
    Math.min(top + height, Math.ceil(sheet.heightPx / shrink)),
  ];
  for (let row = Math.floor(top / size); row * size < bottom; row += 1)
    for (let column = Math.floor(left / size); column * size < right; column += 1) {
      signal.throwIfAborted();
      const bytes = await buffer(await storage.read(tileKey(prefix, zoom, column, row, sheet.tileFormat)));
      await pasteTile(raster, bytes, column * size - left, row * size - top);
    }
  return raster;
}

/** Copies the tile's pixels that lie within the raster, row by row. */
async function pasteTile(raster: GreyRaster, bytes: Buffer, x: number, y: number): Promise<void> {
  const { data, info } = await sharp(bytes)
    .flatten({ background: '#ffffff' })
    .greyscale()
    .raw()
    .toBuffer({ resolveWithObject: true });
  const [from, to] = [Math.max(0, -x), Math.min(info.width, raster.width - x)];
  if (to <= from) return;
  for (let row = Math.max(0, -y); row < info.height && row + y < raster.height; row += 1) {
    const start = row * info.width;
    data.copy(raster.data, (row + y) * raster.width + x + from, start + from, start + to);
  }
}

/** The best quality that keeps the sheet below its size. */
async function compressed({ data, width, height }: GreyRaster): Promise<Buffer> {
  let jpeg = Buffer.alloc(0);
  for (const quality of QUALITIES) {
    jpeg = await sharp(data, { raw: { width, height, channels: 1 } })
      .jpeg({ quality })
      .toBuffer();
    if (jpeg.length <= MOST_BYTES) break;
  }
  return jpeg;
}
