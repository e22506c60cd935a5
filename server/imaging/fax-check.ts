import { rm } from 'node:fs/promises';
import sharp from 'sharp';
import { countLostRows, isCutShort } from './lost-rows.ts';
import { findFaxPictures } from './pdf-scan.ts';
import { refusals } from './refusal.ts';
import { type FaxPicture, writeFax } from './scan-raster.ts';

/**
 * Refuses a page one of whose fax pictures ends before its last row. pdf.js fills up what is missing with white and
 * says nothing; libtiff says so. @throws RenderRefusal
 */
export async function refuseShortFax(file: string, pageNumber: number, scratchFile: string): Promise<void> {
  for (const picture of await findFaxPictures(file, pageNumber)) {
    if (isCutShort(await lostRowsOf(picture, scratchFile), picture.heightPx)) {
      throw refusals.damagedPage('fax data end before the picture does');
    }
  }
}

async function lostRowsOf(picture: FaxPicture, scratchFile: string): Promise<number> {
  try {
    await writeFax(picture, scratchFile);
    const image = sharp(scratchFile, { failOn: 'none', limitInputPixels: false }).resize(16, 16, {
      fit: 'fill',
    });
    const lost = countLostRows(image);
    await image.raw().toBuffer();
    return lost.rows();
  } catch {
    // A variant of fax that libtiff does not take is left to pdf.js.
    return 0;
  } finally {
    await rm(scratchFile, { force: true });
  }
}
