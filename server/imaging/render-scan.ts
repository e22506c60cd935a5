import { rm } from 'node:fs/promises';
import sharp, { type Sharp } from 'sharp';
import { takesLong, writeFirstView, writeTurnedFirstView } from './first-view.ts';
import type { PageScan } from './pdf-scan.ts';
import { RenderRefusal } from './refusal.ts';
import type { RenderedSheet, RenderReport, RenderRequest, TileFormat } from './render-types.ts';
import { writeScan } from './scan-raster.ts';
import { sampledFormat } from './tile-format.ts';
import { writeTilePyramid } from './tile-pyramid.ts';
import { needsDisk, writeUpright } from './turned-scan.ts';

/** As EXIF counts what quarter turns clockwise set upright. */
const ORIENTATION_OF_TURNS = [1, 6, 3, 8] as const;

/**
 * A PDF page that is one scan, shown in the scan's own pixels, upright. Null when the scan is not what the page says
 * of it; the page then has to be drawn. @throws RenderRefusal when part of the scan is missing
 */
export async function renderScan(
  scan: PageScan,
  request: RenderRequest,
  report: RenderReport,
): Promise<RenderedSheet | null> {
  const { outFolder } = request;
  const file = `${outFolder}.scan`;
  const uprightFile = `${outFolder}.upright`;
  try {
    await writeScan(scan, file);
    const open = () => sharp(file, { failOn: 'error', limitInputPixels: false });
    if (!(await isAsStated(open(), scan))) return null;
    const format = await formatOf(scan, open());
    const onItsSide = scan.turns % 2 === 1;
    const widthPx = onItsSide ? scan.heightPx : scan.widthPx;
    const heightPx = onItsSide ? scan.widthPx : scan.heightPx;
    const sheet = { widthPx, heightPx, dpi: scan.dpi, note: '' };
    const first = { ...sheet, tileFormat: format, sourceRows: scan.heightPx };
    const lying = { ...scan, orientation: ORIENTATION_OF_TURNS[scan.turns] };
    if (needsDisk(lying)) {
      const asStored = () => asShown(open(), scan);
      report.firstView(await writeTurnedFirstView(asStored(), lying, first, outFolder));
      await writeUpright(asStored(), lying, uprightFile);
      const image = sharp(uprightFile, { limitInputPixels: false });
      return { ...sheet, ...(await writeTilePyramid(image, sheet, format, outFolder, report.progress)) };
    }
    if (takesLong(sheet)) {
      report.firstView(await writeFirstView(upright(open(), scan), first, outFolder));
    }
    const image = upright(open(), scan);
    return { ...sheet, ...(await writeTilePyramid(image, sheet, format, outFolder, report.progress)) };
  } catch (error) {
    // Drawn by pdf.js, what is missing of the scan would be white or black and nothing would tell.
    if (error instanceof RenderRefusal) throw error;
    await Promise.all(
      [outFolder, `${outFolder}_files`, `${outFolder}.dzi`].map((left) =>
        rm(left, { recursive: true, force: true }),
      ),
    );
    return null;
  } finally {
    await Promise.all([rm(file, { force: true }), rm(uprightFile, { force: true })]);
  }
}

async function isAsStated(image: Sharp, scan: PageScan): Promise<boolean> {
  const { width, height, channels } = await image.metadata();
  return width === scan.widthPx && height === scan.heightPx && channels === scan.samples;
}

/** Turned as the page says; what the picture itself says of its orientation does not count in a PDF. */
function upright(image: Sharp, scan: PageScan): Sharp {
  return asShown(scan.turns === 0 ? image : image.rotate(scan.turns * 90), scan);
}

function asShown(image: Sharp, scan: PageScan): Sharp {
  const shown = scan.coding === 'jpeg' && scan.inverted ? image.negate() : image;
  return shown.toColourspace(scan.samples === 1 ? 'b-w' : 'srgb');
}

async function formatOf(scan: PageScan, image: Sharp): Promise<TileFormat> {
  if (scan.coding === 'jpeg') return 'jpeg';
  return scan.bits === 1 ? 'png' : sampledFormat(image, scan.widthPx, scan.heightPx);
}
