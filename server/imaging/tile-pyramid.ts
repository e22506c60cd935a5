import { readdir, rename, rm } from 'node:fs/promises';
import path from 'node:path';
import sharp, { type Sharp } from 'sharp';
import { THUMBNAIL_PX, TILE_SIZE_PX } from '#shared/contract/limits.ts';
import { countLostRows, isCutShort } from './lost-rows.ts';
import { refusals } from './refusal.ts';
import type { RenderedSheet, TileFormat } from './render-types.ts';

const PROGRESS_MS = 400;

// Measured on sheets of 70 and 560 million pixels: WebP takes ten times as long as PNG, and PNG level 1 no less than
// level 4 for twice the disk. JPEG keeps full colour resolution, because red and blue lines a pixel wide fade under
// 4:2:0; Huffman tables of each tile's own would take a third more time for a tenth less disk.
const encode: Record<TileFormat, (image: Sharp) => Sharp> = {
  png: (image) => image.png({ compressionLevel: 4 }),
  jpeg: (image) => image.jpeg({ quality: 90, chromaSubsampling: '4:4:4', optimiseCoding: false }),
};

/** Number of the full-size level, when level 0 is the whole image in one tile and each level doubles. */
export function maxZoomOf(widthPx: number, heightPx: number): number {
  return Math.max(0, Math.ceil(Math.log2(Math.max(widthPx, heightPx) / TILE_SIZE_PX)));
}

/** Number of tiles of the full-size level. */
function fullSizeTiles(widthPx: number, heightPx: number): number {
  return Math.ceil(widthPx / TILE_SIZE_PX) * Math.ceil(heightPx / TILE_SIZE_PX);
}

/**
 * Writes the tiles and the thumbnail of an image into a new folder. The source is read once, from top to bottom:
 * the thumbnail is made of the smallest tile.
 */
export async function writeTilePyramid(
  image: Sharp,
  size: { widthPx: number; heightPx: number },
  format: TileFormat,
  outFolder: string,
  onProgress: (share: number) => void,
): Promise<Pick<RenderedSheet, 'maxZoom' | 'tileSizePx' | 'tileFormat'>> {
  const maxZoom = maxZoomOf(size.widthPx, size.heightPx);
  const stop = reportProgress(
    path.join(filesFolderOf(outFolder), String(maxZoom)),
    fullSizeTiles(size.widthPx, size.heightPx),
    onProgress,
  );
  try {
    await cutTiles(image, format, size.heightPx, outFolder);
  } finally {
    stop();
  }
  return { maxZoom, tileSizePx: TILE_SIZE_PX, tileFormat: format };
}

const filesFolderOf = (outFolder: string) => `${outFolder}_files`;

/** Cuts an image that is decoded from `sourceRows` rows. @throws RenderRefusal when some of them are missing */
export async function cutTiles(
  image: Sharp,
  format: TileFormat,
  sourceRows: number,
  outFolder: string,
): Promise<void> {
  const lost = countLostRows(image);
  await encode[format](image)
    .tile({ size: TILE_SIZE_PX, overlap: 0, depth: 'onetile', layout: 'dz' })
    .toFile(`${outFolder}.dz`);
  if (isCutShort(lost.rows(), sourceRows)) throw refusals.damagedImage('fax data end before the page does');
  await finishFolder(outFolder, format);
}

/** Leaves nothing but tiles and the thumbnail. */
async function finishFolder(outFolder: string, format: TileFormat): Promise<void> {
  const filesFolder = filesFolderOf(outFolder);
  await rm(`${outFolder}.dzi`);
  await rm(path.join(filesFolder, 'vips-properties.xml'), { force: true });
  await rename(filesFolder, outFolder);
  await sharp(path.join(outFolder, '0', `0_0.${format}`))
    .resize({ width: THUMBNAIL_PX, height: THUMBNAIL_PX, fit: 'inside', withoutEnlargement: true })
    .webp({ quality: 80, effort: 0 })
    .toFile(path.join(outFolder, 'thumbnail.webp'));
}

/** libvips tells nothing while it writes; the number of finished tiles does. */
function reportProgress(folder: string, total: number, onProgress: (share: number) => void): () => void {
  let told = 0;
  const timer = setInterval(async () => {
    // Not there before the first tile and, while the last steps are taken, no more: what was told stands then.
    const written = await readdir(folder).then(
      (names) => names.length,
      () => 0,
    );
    told = Math.max(told, Math.min(1, written / total));
    onProgress(told);
  }, PROGRESS_MS);
  return () => clearInterval(timer);
}
