import { rm } from 'node:fs/promises';
import sharp from 'sharp';
import { type RenditionGeometry, renditionGeometry } from '#shared/compute/renditions/rendition-geometry.ts';
import { removeSpecks } from '#shared/compute/renditions/specks.ts';
import {
  applyTable,
  endTable,
  levelTable,
  type PixelRows,
  speckTone,
} from '#shared/compute/renditions/tones.ts';
import { MAX_PIXELS } from '#shared/contract/limits.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';
import { BandRaster } from './band-raster.ts';
import { BaseRaster, type BaseTiles } from './base-tiles.ts';
import { refusals } from './refusal.ts';
import type { RenderedRendition, RenditionRequest, TileFormat } from './render-types.ts';
import { resampledRows } from './resample.ts';
import { sampledFormat } from './tile-format.ts';
import { writeTilePyramid } from './tile-pyramid.ts';

/** Rows that are worked on at once. */
const BAND_ROWS = 256;
/** Part of the work that is over when the picture is worked out and only its tiles are left to write. */
const PICTURE_PART = 0.6;

/**
 * Makes a cleaned-up picture of a sheet out of its base tiles and cuts it into tiles. Worked out in bands into a raster
 * beside the output folder, so that a sheet of any size takes the same memory. @throws RenderRefusal
 */
export async function renderRendition(
  { base, settings, outFolder }: RenditionRequest,
  onProgress: (share: number) => void,
): Promise<RenderedRendition> {
  const geometry = renditionGeometry(base, settings);
  if (geometry === null) throw refusals.noPicture();
  const { widthPx, heightPx } = geometry;
  if (widthPx * heightPx > MAX_PIXELS) throw refusals.tooManyPixels(widthPx, heightPx, MAX_PIXELS);
  const raster = `${outFolder}.tif`;
  try {
    await writeRaster(base, geometry, settings, raster, (share) => onProgress(PICTURE_PART * share));
    const format = await formatOf(base, settings, raster, geometry);
    const picture = sharp(raster, { limitInputPixels: false });
    const tiles = await writeTilePyramid(picture, geometry, format, outFolder, (share) =>
      onProgress(PICTURE_PART + (1 - PICTURE_PART) * share),
    );
    return { widthPx, heightPx, ...tiles };
  } finally {
    await rm(raster, { force: true });
  }
}

async function writeRaster(
  tiles: BaseTiles,
  geometry: RenditionGeometry,
  settings: RenditionSettings,
  file: string,
  onProgress: (share: number) => void,
): Promise<void> {
  const isBlackAndWhite = settings.threshold !== null;
  const base = await BaseRaster.open(tiles, isBlackAndWhite, settings.whitenPaper);
  const { widthPx, heightPx, toBase } = geometry;
  const samples = isBlackAndWhite ? 1 : base.channels;
  const kind = { samples, bits: 8, zeroIs: 'black' } as const;
  const raster = await BandRaster.create(file, widthPx, heightPx, kind);
  const [levels, ends] = [levelTable(settings), endTable(settings)];
  // Specks are told from lines by what lies above and below the band too.
  const beyond = settings.specksPx;
  try {
    for (let top = 0; top < heightPx; top += BAND_ROWS) {
      const rows = Math.min(BAND_ROWS, heightPx - top);
      const from = Math.max(0, top - beyond);
      const to = Math.min(heightPx, top + rows + beyond);
      const band = await resampledRows(base, toBase, from, widthPx, to - from);
      applyTable(band, levels);
      if (beyond > 0) removeSpecks(band, beyond, speckTone(settings));
      applyTable(band, ends);
      await raster.append(partOf(band, top - from, rows, samples));
      onProgress((top + rows) / heightPx);
    }
  } finally {
    await raster.close();
  }
}

/** Some rows of a band; only the first of three equal colours where one is wanted. */
function partOf(
  { data, widthPx, channels }: PixelRows,
  top: number,
  rows: number,
  samples: 1 | 3,
): Uint8Array {
  const part = data.subarray(top * widthPx * channels, (top + rows) * widthPx * channels);
  const whole = part as Uint8Array;
  if (samples === channels) return whole;
  return Uint8Array.from({ length: widthPx * rows }, (_, index) => whole[index * channels]!);
}

async function formatOf(
  base: BaseTiles,
  settings: RenditionSettings,
  raster: string,
  { widthPx, heightPx }: RenditionGeometry,
): Promise<TileFormat> {
  if (settings.threshold !== null) return 'png';
  if (base.format === 'jpeg') return 'jpeg';
  return sampledFormat(sharp(raster, { limitInputPixels: false }), widthPx, heightPx);
}
