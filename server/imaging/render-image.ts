import { rm } from 'node:fs/promises';
import path from 'node:path';
import sharp, { type Metadata, type Sharp } from 'sharp';
import { MAX_PIXELS } from '#shared/contract/limits.ts';
import { takesLong, writeFirstView, writeTurnedFirstView } from './first-view.ts';
import { openImage, readHeader, refuseDecoding, statedDpi } from './image-source.ts';
import { isPlainLab, openLab } from './lab-tiff.ts';
import { refusals } from './refusal.ts';
import type { RenderedSheet, RenderReport, RenderRequest, TileFormat } from './render-types.ts';
import { pixelHeightRatio, squaredSize } from './square-pixels.ts';
import { readTiffPages, type TiffPage } from './tiff-directory.ts';
import { sampledFormat } from './tile-format.ts';
import { writeTilePyramid } from './tile-pyramid.ts';
import { type LyingScan, needsDisk, writeUpright } from './turned-scan.ts';

/** Draws one page of a scan at its own size, upright, in 8-bit grey or sRGB on white. @throws RenderRefusal */
export async function renderImage(request: RenderRequest, report: RenderReport): Promise<RenderedSheet> {
  const { file, pageNumber, outFolder } = request;
  const directory = request.kind === 'tiff' ? (await readTiffPages(file))[pageNumber - 1] : undefined;
  if (directory && isPlainLab(directory)) return renderLab(request, directory, report);
  const header = await readHeader(file, pageNumber);
  const stored = pixelHeightRatio(directory);
  const ratio = liesOnItsSide(header) ? 1 / stored : stored;
  const scanned = { widthPx: header.autoOrient.width, heightPx: header.autoOrient.height };
  const size = squaredSize(scanned, ratio);
  if (size.widthPx * size.heightPx > MAX_PIXELS) {
    throw refusals.tooManyPixels(size.widthPx, size.heightPx, MAX_PIXELS);
  }
  try {
    const format = await chooseFormat(request, header, directory);
    const lying = lyingScan(header);
    if (ratio === 1 && header.depth === 'uchar' && needsDisk(lying)) {
      const sheet = { ...size, dpi: statedDpi(header), note: '', tileFormat: format };
      return await renderTurned(request, lying, sheet, report);
    }
    const open = async () => upright(await toEightBit(openImage(file, pageNumber), request, header), header);
    const stated = statedDpi(header);
    // Stated across the page as stored; a page stretched across has the finer resolution down the page everywhere.
    const dpi = stated && stored < 1 ? stated / stored : stated;
    const sheet = { ...size, dpi, note: stretchNote(ratio) };
    if (takesLong(size)) {
      const first = { ...sheet, tileFormat: format, sourceRows: scanned.heightPx };
      report.firstView(await writeFirstView(await open(), first, outFolder));
    }
    const image = await open();
    if (ratio !== 1) image.resize({ width: size.widthPx, height: size.heightPx, fit: 'fill' });
    return { ...sheet, ...(await writeTilePyramid(image, size, format, outFolder, report.progress)) };
  } catch (error) {
    return refuseDecoding(error);
  }
}

const lyingScan = ({ width, height, channels, orientation = 1 }: Metadata): LyingScan => ({
  widthPx: width,
  heightPx: height,
  samples: channels <= 2 ? 1 : 3,
  orientation,
});

/** A large scan that has to be turned, by way of the disk. */
async function renderTurned(
  { file, pageNumber, outFolder }: RenderRequest,
  lying: LyingScan,
  sheet: Omit<RenderedSheet, 'maxZoom' | 'tileSizePx'>,
  report: RenderReport,
): Promise<RenderedSheet> {
  const asStored = () => onWhite(openImage(file, pageNumber), lying.samples);
  const toCome = { ...sheet, sourceRows: lying.heightPx };
  report.firstView(await writeTurnedFirstView(asStored(), lying, toCome, outFolder));
  const upright = `${outFolder}.upright`;
  try {
    await writeUpright(asStored(), lying, upright);
    const image = sharp(upright, { limitInputPixels: false });
    return {
      ...sheet,
      ...(await writeTilePyramid(image, sheet, sheet.tileFormat, outFolder, report.progress)),
    };
  } finally {
    await rm(upright, { force: true });
  }
}

async function renderLab(request: RenderRequest, page: TiffPage, report: RenderReport) {
  const image = await openLab(request.file, request.pageNumber, page, path.dirname(request.outFolder));
  const size = { widthPx: page.widthPx, heightPx: page.heightPx };
  const tiles = await writeTilePyramid(image, size, 'jpeg', request.outFolder, report.progress);
  return { ...size, dpi: null, ...tiles, note: '' };
}

/** EXIF and TIFF orientations 5 to 8 turn the page by a quarter. */
const liesOnItsSide = (header: Metadata) => (header.orientation ?? 1) >= 5;

function stretchNote(ratio: number): string {
  if (ratio === 1) return '';
  return 'The scan has more dots per inch in one direction than in the other, as fax machines make them; it was stretched so that lengths are true.';
}

const onWhite = (image: Sharp, samples: 1 | 3): Sharp =>
  image.flatten({ background: '#ffffff' }).toColourspace(samples === 1 ? 'b-w' : 'srgb');

function upright(image: Sharp, header: Metadata): Sharp {
  return onWhite(image.autoOrient(), header.channels <= 2 ? 1 : 3);
}

/**
 * Samples wider than a byte brought to the range a screen shows. A 12-bit scan stored in 16-bit words fills only a
 * sixteenth of the range and would come out black, that is blank, if it were merely shifted down.
 */
async function toEightBit(image: Sharp, request: RenderRequest, header: Metadata): Promise<Sharp> {
  if (header.depth === 'uchar') return image;
  if (header.depth === 'uint') return image.linear(255 / 0xffffffff, 0);
  const { channels } = await openImage(request.file, request.pageNumber).stats();
  const colours = header.hasAlpha ? channels.slice(0, -1) : channels;
  const low = Math.min(...colours.map((channel) => channel.min));
  const high = Math.max(...colours.map((channel) => channel.max));
  if (!Number.isFinite(low) || !Number.isFinite(high)) throw refusals.damagedImage('samples are not numbers');
  if (header.depth === 'ushort') return high > 4095 || high === 0 ? image : image.linear(65535 / high, 0);
  const scale = high > low ? 255 / (high - low) : 1;
  return image.linear(scale, -low * scale);
}

async function chooseFormat(
  request: RenderRequest,
  header: Metadata,
  directory: TiffPage | undefined,
): Promise<TileFormat> {
  if (request.kind === 'jpeg') return 'jpeg';
  if (directory?.bitsPerSample === 1 || (header.bitsPerSample ?? 8) <= 2) return 'png';
  return sampledFormat(openImage(request.file, request.pageNumber), header.width, header.height);
}
