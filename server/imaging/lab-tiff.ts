import { copyFile, open } from 'node:fs/promises';
import path from 'node:path';
import sharp, { type Sharp } from 'sharp';
import { refuseDecoding } from './image-source.ts';
import { refusals } from './refusal.ts';
import type { TiffPage } from './tiff-directory.ts';

const PHOTOMETRIC_RGB = 2;
const PHOTOMETRIC_LAB = 8;
/** Lab scans are converted in memory; larger ones than this are not met and would not fit. */
const MAX_LAB_PIXELS = 40_000_000;

/** Whether this is an 8-bit CIE L*a*b* page, which libvips refuses ("bad labq format"). */
export function isPlainLab(page: TiffPage): boolean {
  return page.photometric === PHOTOMETRIC_LAB && page.samplesPerPixel === 3 && page.photometricAt !== null;
}

/**
 * An 8-bit Lab page as sRGB. The samples are read as if they were RGB, from a copy whose photometric tag says so,
 * and converted here. TIFF 6.0, section 23: L is 0 to 255 for 0 to 100, a and b are signed bytes.
 */
export async function openLab(
  file: string,
  pageNumber: number,
  page: TiffPage,
  folder: string,
): Promise<Sharp> {
  if (page.widthPx * page.heightPx > MAX_LAB_PIXELS) {
    throw refusals.tooManyPixels(page.widthPx, page.heightPx, MAX_LAB_PIXELS);
  }
  const copy = path.join(folder, 'lab.tif');
  await copyFile(file, copy);
  await retag(copy, page);
  const { data, info } = await sharp(copy, { page: pageNumber - 1, failOn: 'error' })
    .raw()
    .toBuffer({ resolveWithObject: true })
    .catch(refuseDecoding);
  for (let at = 0; at < data.length; at += 3) writeSrgb(data, at);
  return sharp(data, { raw: { width: info.width, height: info.height, channels: 3 } });
}

async function retag(copy: string, page: TiffPage): Promise<void> {
  const handle = await open(copy, 'r+');
  try {
    const order = (await handle.read(Buffer.alloc(2), 0, 2, 0)).buffer.toString('latin1');
    const value = order === 'MM' ? [0, PHOTOMETRIC_RGB] : [PHOTOMETRIC_RGB, 0];
    await handle.write(Buffer.from(value), 0, 2, page.photometricAt ?? 0);
  } finally {
    await handle.close();
  }
}

/** CIE 15: L*a*b* (D50, as TIFF readers assume) to XYZ; Bradford-adapted matrix to linear sRGB (IEC 61966-2-1). */
function writeSrgb(data: Buffer, at: number): void {
  const fy = ((data[at] ?? 0) / 2.55 + 16) / 116;
  const x = 0.9642 * inverse(fy + data.readInt8(at + 1) / 500);
  const y = inverse(fy);
  const z = 0.8249 * inverse(fy - data.readInt8(at + 2) / 200);
  data[at] = companded(3.1339 * x - 1.6169 * y - 0.4906 * z);
  data[at + 1] = companded(-0.9788 * x + 1.9161 * y + 0.0335 * z);
  data[at + 2] = companded(0.0719 * x - 0.229 * y + 1.4052 * z);
}

function inverse(f: number): number {
  return f > 6 / 29 ? f ** 3 : (f - 4 / 29) * 3 * (6 / 29) ** 2;
}

function companded(linear: number): number {
  const v = Math.min(1, Math.max(0, linear));
  return Math.round(255 * (v <= 0.0031308 ? 12.92 * v : 1.055 * v ** (1 / 2.4) - 0.055));
}
