import { type Canvas, createCanvas } from '@napi-rs/canvas';
import type { PageViewport, PDFPageProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { RenderRefusal, refusals } from './refusal.ts';
import { isTooLargePicture, pictureWarning, takeWarnings } from './render-log.ts';

/** Part of a page on white, as tall as `rows`. @throws RenderRefusal when a picture of the page is damaged */
export async function drawBand(
  page: PDFPageProxy,
  viewport: PageViewport,
  width: number,
  rows: number,
): Promise<Canvas> {
  const canvas = createCanvas(width, rows);
  const context = canvas.getContext('2d');
  try {
    // pdf.js is typed for the browser; this canvas has the part of the interface it draws with.
    const canvasContext = context as unknown as CanvasRenderingContext2D;
    const task = page.render({ canvas: null, canvasContext, viewport });
    task.onContinue = collectFirst();
    await task.promise;
  } catch (error) {
    throw error instanceof RenderRefusal ? error : refusals.damagedPdf(error);
  }
  refusePictureFaults();
  return canvas;
}

/**
 * Buffers of a decoded scan lie outside the heap, where their size hurries no collection; what its decoding left
 * behind is collected before the scan is painted, or an A1 sheet would need half as much memory again.
 */
function collectFirst(): (proceed: () => void) => void {
  let collectedAt = 0;
  return (proceed) => {
    if (Date.now() - collectedAt > 500 && process.memoryUsage.rss() > 400e6) {
      globalThis.gc?.();
      collectedAt = Date.now();
    }
    proceed();
  };
}

/** A page without one of its pictures would look like a sheet with nothing drawn on it. */
export function refusePictureFaults(): void {
  const fault = pictureWarning(takeWarnings());
  if (!fault) return;
  throw isTooLargePicture(fault) ? refusals.pictureTooLarge() : refusals.damagedPage(fault);
}
