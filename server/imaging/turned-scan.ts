import { rm } from 'node:fs/promises';
import sharp, { type Sharp } from 'sharp';
import { BandRaster, RGB } from './band-raster.ts';
import { countLostRows, isCutShort } from './lost-rows.ts';
import { refusals } from './refusal.ts';

/** Turned in memory a picture has to be there whole; one that would take more bytes is turned on disk. */
const MOST_BYTES_TURNED_IN_MEMORY = 250_000_000;
const TILE_PX = 512;
/** Bytes of a band that is turned at once. */
const BAND_BYTES = 40_000_000;

/** A picture as it is stored, lying on its side or on its head, in 8-bit grey or sRGB. */
export interface LyingScan {
  widthPx: number;
  heightPx: number;
  samples: 1 | 3;
  /** 1 to 8 as EXIF and TIFF 6.0 (tag 274) count: from 5 on the picture lies on its side. */
  orientation: number;
}

export function needsDisk({ widthPx, heightPx, samples, orientation }: LyingScan): boolean {
  return orientation > 1 && widthPx * heightPx * samples > MOST_BYTES_TURNED_IN_MEMORY;
}

/** `picture`, small enough for memory, set upright. */
export async function setUpright(picture: Sharp, scan: LyingScan): Promise<Sharp> {
  return turned(await wholly(picture, scan, rawOf), scan);
}

/** Runs `use` on the stored picture. @throws RenderRefusal when rows of it are missing */
async function wholly<T>(picture: Sharp, scan: LyingScan, use: (picture: Sharp) => Promise<T>): Promise<T> {
  const lost = countLostRows(picture);
  const result = await use(picture);
  if (isCutShort(lost.rows(), scan.heightPx))
    throw refusals.damagedImage('fax data end before the page does');
  return result;
}

/**
 * Writes `picture` upright into an uncompressed file at `file`, by way of a tiled one beside it, so that neither ever
 * lies in memory whole: each band of the upright picture is a row or a column of the other's tiles.
 * @throws RenderRefusal when part of it is missing
 */
export async function writeUpright(picture: Sharp, scan: LyingScan, file: string): Promise<void> {
  const lying = `${file}.lying`;
  try {
    await wholly(picture, scan, (stored) =>
      stored
        .tiff({ compression: 'none', tile: true, tileWidth: TILE_PX, tileHeight: TILE_PX, bigtiff: true })
        .toFile(lying),
    );
    await copyByBands(lying, scan, file);
  } finally {
    await rm(lying, { force: true });
  }
}

async function copyByBands(lying: string, scan: LyingScan, file: string): Promise<void> {
  const onItsSide = scan.orientation >= 5;
  const [width, height] = onItsSide ? [scan.heightPx, scan.widthPx] : [scan.widthPx, scan.heightPx];
  const kind = scan.samples === 1 ? ({ samples: 1, bits: 8, zeroIs: 'black' } as const) : RGB;
  const tiles = Math.max(1, Math.floor(BAND_BYTES / (width * scan.samples * TILE_PX)));
  const output = await BandRaster.create(file, width, height, kind);
  try {
    for (let top = 0; top < height; top += tiles * TILE_PX) {
      const part = partOf(scan, top, Math.min(tiles * TILE_PX, height - top));
      const raw = await sharp(lying, { limitInputPixels: false, sequentialRead: false })
        .extract(part)
        .raw()
        .toBuffer({ resolveWithObject: true });
      await output.append(await turned(raw, scan).raw().toBuffer());
    }
  } finally {
    await output.close();
  }
}

/** Where rows `top` to `top + rows` of the upright picture lie in the stored one. */
function partOf({ widthPx, heightPx, orientation }: LyingScan, top: number, rows: number) {
  const fromTheEnd = [3, 4, 7, 8].includes(orientation);
  if (orientation >= 5)
    return { left: fromTheEnd ? widthPx - top - rows : top, top: 0, width: rows, height: heightPx };
  return { left: 0, top: fromTheEnd ? heightPx - top - rows : top, width: widthPx, height: rows };
}

type Raw = Awaited<ReturnType<typeof rawOf>>;
const rawOf = (picture: Sharp) => picture.raw().toBuffer({ resolveWithObject: true });

/** Exif 2.32, tag Orientation: mirrored first, then turned clockwise, which is the package's order. */
function turned({ data, info }: Raw, { orientation }: LyingScan): Sharp {
  const { width, height, channels } = info;
  const picture = sharp(data, { raw: { width, height, channels }, limitInputPixels: false });
  if (orientation === 2) return picture.flop();
  if (orientation === 3) return picture.rotate(180);
  if (orientation === 4) return picture.flip();
  if (orientation === 5) return picture.flip().rotate(90);
  if (orientation === 6) return picture.rotate(90);
  if (orientation === 7) return picture.flip().rotate(270);
  return orientation === 8 ? picture.rotate(270) : picture;
}
