import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp, { type Sharp } from 'sharp';
import { BandRaster, type RasterKind, RGB } from '#server/imaging/band-raster.ts';
import { penPx, type SheetSize, type Stroke, strokesOf } from './line-work.ts';

const BAND_PIXELS = 60_000_000;
const GREY: RasterKind = { samples: 1, bits: 8, zeroIs: 'black' };

/** 1 bit, CCITT group 4, as plan scanners write it. */
export const groupFour = (size: SheetSize): Promise<Buffer> =>
  encoded(size, GREY, (image) =>
    image
      .toColourspace('b-w')
      .tiff({ compression: 'ccittfax4', bitdepth: 1, xres: size.dpi / 25.4, yres: size.dpi / 25.4 })
      .toBuffer(),
  );

/** Colour with a paper's tone and grain, quality 90; `orientation` as a camera or a scanner states it. */
export const colourJpeg = (size: SheetSize, orientation = 1): Promise<Buffer> =>
  encoded(size, RGB, (image) =>
    image.withMetadata({ density: size.dpi, orientation }).jpeg({ quality: 90 }).toBuffer(),
  );

/** Draws the sheet by bands into a file, because a whole one of 560 million pixels fits no buffer. */
async function encoded(
  size: SheetSize,
  kind: RasterKind,
  encode: (image: Sharp) => Promise<Buffer>,
): Promise<Buffer> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-sheet-'));
  const file = path.join(folder, 'sheet.tif');
  try {
    const raster = await BandRaster.create(file, size.width, size.height, kind);
    const rows = Math.floor(BAND_PIXELS / size.width);
    const drawing = pathOf(strokesOf(size));
    const onPaper = kind.samples === 3 ? createPaper() : (grey: Buffer) => grey;
    for (let top = 0; top < size.height; top += rows)
      await raster.append(onPaper(await greyBand(size, drawing, top, Math.min(rows, size.height - top))));
    await raster.close();
    return await encode(sharp(file, { limitInputPixels: false }));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function pathOf(strokes: readonly Stroke[]): string {
  return strokes
    .map(({ kind, places: [start, ...rest] }) => `M${start}${kind === 'curve' ? 'C' : 'L'}${rest.join(' ')}`)
    .join('');
}

/** Rows `top` to `top + rows` of the sheet, one byte a pixel. */
function greyBand(size: SheetSize, drawing: string, top: number, rows: number): Promise<Buffer> {
  const { width } = size;
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${rows}" viewBox="0 ${top} ${width} ${rows}">
    <rect y="${top}" width="${width}" height="${rows}" fill="white"/>
    <path fill="none" stroke="black" stroke-width="${penPx(size)}" d="${drawing}"/></svg>`;
  return sharp(Buffer.from(svg), { limitInputPixels: false, unlimited: true })
    .flatten({ background: 'white' })
    .greyscale()
    .raw()
    .toBuffer();
}

/** Gives white paper a tone and a grain that is the same every time: a short linear congruence is grain enough. */
function createPaper(): (grey: Buffer) => Buffer {
  let grain = 1;
  return (grey) => {
    const rgb = Buffer.allocUnsafe(grey.length * 3);
    for (let index = 0; index < grey.length; index++) {
      grain = (Math.imul(grain, 1_103_515_245) + 12_345) & 0x7fffffff;
      const tone = Math.max(0, (grey[index] ?? 0) - 12 - ((grain >> 16) & 15));
      rgb[index * 3] = tone;
      rgb[index * 3 + 1] = Math.max(0, tone - 4);
      rgb[index * 3 + 2] = Math.max(0, tone - 18);
    }
    return rgb;
  };
}
