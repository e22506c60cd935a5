import { rm } from 'node:fs/promises';
import type { PageViewport, PDFPageProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import sharp from 'sharp';
import { DEFAULT_DPI } from '#shared/contract/limits.ts';
import { BandRaster } from './band-raster.ts';
import { drawBand, refusePictureFaults } from './draw-band.ts';
import { firstLevelOf, writeFirstView } from './first-view.ts';
import { flatShare, LINE_WORK_SHARE } from './flatness.ts';
import { openPage, withPdf } from './pdf-document.ts';
import { type ChosenDpi, chooseDpi, mainScanDpi } from './pdf-dpi.ts';
import { largestPicturePixels } from './pdf-picture-sizes.ts';
import { takeWarnings } from './render-log.ts';
import { renderScan } from './render-scan.ts';
import type { FirstView, RenderedSheet, RenderReport, RenderRequest } from './render-types.ts';
import { writeTilePyramid } from './tile-pyramid.ts';

/**
 * Pixels drawn at a time, 4 bytes each on the canvas beside the decoded scan: three pieces for an A1 sheet at 300
 * dpi. Larger pieces are faster, because pdf.js prepares a scan anew for each, but an A1 scan then needs 1.3 GB.
 */
const BAND_PIXELS = 24_000_000;
/** Pixels handed on at a time, so that no second copy of the band exists. */
const SLICE_PIXELS = 2_000_000;
/** A page with more pixels has its first view drawn before it. */
const LONG_DRAWING_PIXELS = 20_000_000;
/** Share of the work that is drawing; the rest is cutting tiles. */
const DRAWING_SHARE = 0.7;

interface DrawnPage extends ChosenDpi {
  widthPx: number;
  heightPx: number;
  isGrey: boolean;
  isLineWork: boolean;
}

/** One page of a PDF: a scan as it is, anything else drawn, turned as the page says, on white. @throws RenderRefusal */
export async function renderPdf(request: RenderRequest, report: RenderReport): Promise<RenderedSheet> {
  const hasPictures = (await largestPicturePixels(request.file)) > 0;
  if (!hasPictures) return renderDrawn(request, report);
  const { withoutEmptyPictures } = await import('./without-empty-pictures.ts');
  return withoutEmptyPictures(request, (changed) => renderWithPictures(changed, report));
}

async function renderWithPictures(request: RenderRequest, report: RenderReport): Promise<RenderedSheet> {
  const asItIs = await renderAsScan(request, report);
  if (asItIs) return asItIs;
  await refuseFaults(request);
  return renderDrawn(request, report);
}

/** Loaded when a file holds a picture at all: most of what it needs takes longer to load than to use. */
async function renderAsScan(request: RenderRequest, report: RenderReport) {
  const { findPageScan } = await import('./pdf-scan.ts');
  const scan = await findPageScan(request.file, request.pageNumber);
  return scan && renderScan(scan, request, report);
}

async function refuseFaults({ file, pageNumber, outFolder }: RenderRequest): Promise<void> {
  const { refuseShortFax } = await import('./fax-check.ts');
  await refuseShortFax(file, pageNumber, `${outFolder}.fax`);
}

async function renderDrawn(request: RenderRequest, report: RenderReport): Promise<RenderedSheet> {
  const raster = `${request.outFolder}.tif`;
  try {
    const drawn = await withPdf(request.file, async (document) => {
      const page = await openPage(document, request.pageNumber);
      return drawPage(page, request, raster, report);
    });
    // The page's pictures are dead now, but lie outside the heap, where their size hurries no collection.
    globalThis.gc?.();
    const { widthPx, heightPx, dpi, note } = drawn;
    const image = sharp(raster, { limitInputPixels: false }).toColourspace(drawn.isGrey ? 'b-w' : 'srgb');
    const tiles = await writeTilePyramid(
      image,
      drawn,
      drawn.isLineWork ? 'png' : 'jpeg',
      request.outFolder,
      (share) => report.progress(DRAWING_SHARE + share * (1 - DRAWING_SHARE)),
    );
    return { widthPx, heightPx, dpi, note, isDrawn: true, ...tiles };
  } finally {
    await rm(raster, { force: true });
  }
}

async function drawPage(
  page: PDFPageProxy,
  request: RenderRequest,
  raster: string,
  report: RenderReport,
): Promise<DrawnPage> {
  const size = page.getViewport({ scale: 1 });
  takeWarnings();
  const scanDpi = request.dpi ? null : await finerScanDpi(page, request.file, size);
  refusePictureFaults();
  const chosen = chooseDpi(size.width, size.height, scanDpi, request.dpi);
  const scale = chosen.dpi / 72;
  const widthPx = Math.max(1, Math.round(size.width * scale));
  const heightPx = Math.max(1, Math.round(size.height * scale));
  if (widthPx * heightPx > LONG_DRAWING_PIXELS)
    report.firstView(await drawFirstView(page, { ...chosen, widthPx, heightPx }, request.outFolder));
  const character = await drawBands(page, scale, { widthPx, heightPx }, raster, (share) =>
    report.progress(share * DRAWING_SHARE),
  );
  return { ...chosen, widthPx, heightPx, ...character };
}

/** The page drawn small: what a sheet of paper held at arm's length shows. */
async function drawFirstView(
  page: PDFPageProxy,
  sheet: ChosenDpi & { widthPx: number; heightPx: number },
  outFolder: string,
): Promise<FirstView> {
  const { widthPx, heightPx } = firstLevelOf(sheet);
  const scale = (sheet.dpi / 72) * (widthPx / sheet.widthPx);
  const canvas = await drawBand(page, page.getViewport({ scale }), widthPx, heightPx);
  const rgba = canvas.data();
  const isLineWork = flatShare(rgba, widthPx, 4, 3) >= LINE_WORK_SHARE;
  const image = sharp(rgba, { raw: { width: widthPx, height: heightPx, channels: 4 } }).removeAlpha();
  const first = { ...sheet, tileFormat: isLineWork ? 'png' : 'jpeg', sourceRows: heightPx } as const;
  const view = await writeFirstView(image, first, outFolder);
  // Keeps the canvas alive until its pixels have been used, and gives its memory back at once.
  canvas.width = 1;
  return { ...view, isDrawn: true };
}

/**
 * Looking at the page's operators decodes its pictures a first time; it is done only when the file holds one that
 * would be finer than the default on this page.
 */
async function finerScanDpi(page: PDFPageProxy, file: string, size: PageViewport): Promise<number | null> {
  const atDefault = (size.width * size.height * DEFAULT_DPI * DEFAULT_DPI) / (72 * 72);
  return (await largestPicturePixels(file)) > 1.1 * atDefault ? mainScanDpi(page) : null;
}

async function drawBands(
  page: PDFPageProxy,
  scale: number,
  { widthPx, heightPx }: { widthPx: number; heightPx: number },
  raster: string,
  onProgress: (share: number) => void,
) {
  const bandRows = Math.max(1, Math.min(heightPx, Math.floor(BAND_PIXELS / widthPx)));
  const output = await BandRaster.create(raster, widthPx, heightPx);
  let [isGrey, flatRows] = [true, 0];
  try {
    for (let top = 0; top < heightPx; top += bandRows) {
      const rows = Math.min(bandRows, heightPx - top);
      const canvas = await drawBand(page, page.getViewport({ scale, offsetY: -top }), widthPx, rows);
      const rgba = canvas.data();
      flatRows += rows * flatShare(rgba, widthPx, 4, 3);
      const sliceBytes = Math.max(1, Math.floor(SLICE_PIXELS / widthPx)) * widthPx * 4;
      for (let at = 0; at < rgba.length; at += sliceBytes) {
        const rgb = withoutAlpha(rgba.subarray(at, at + sliceBytes));
        isGrey &&= hasNoColour(rgb);
        await output.append(rgb);
      }
      // Gives the memory back at once, and keeps the canvas alive until here: its data are a view that does not.
      canvas.width = 1;
      onProgress((top + rows) / heightPx);
    }
  } finally {
    await output.close();
  }
  return { isGrey, isLineWork: flatRows / heightPx >= LINE_WORK_SHARE };
}

/** The band is opaque (drawn on white), so premultiplied and plain colours are the same. */
function withoutAlpha(rgba: Uint8Array): Uint8Array {
  const pixels = rgba.length >> 2;
  const rgb = new Uint8Array(pixels * 3);
  for (let pixel = 0, from = 0, to = 0; pixel < pixels; pixel++, from += 4, to += 3) {
    rgb[to] = rgba[from]!;
    rgb[to + 1] = rgba[from + 1]!;
    rgb[to + 2] = rgba[from + 2]!;
  }
  return rgb;
}

function hasNoColour(rgb: Uint8Array): boolean {
  for (let at = 0; at < rgb.length; at += 3) {
    if (rgb[at] !== rgb[at + 1] || rgb[at] !== rgb[at + 2]) return false;
  }
  return true;
}
