import { buffer } from 'node:stream/consumers';
import PDFDocument from 'pdfkit';
import { penPx, type SheetSize, strokesOf } from './line-work.ts';

/** The sheet as a CAD program plots it: one page of vectors. */
export function vectorPdf(size: SheetSize): Promise<Buffer> {
  const page = pageOf(size);
  const toPt = 72 / size.dpi;
  page.scale(toPt).lineWidth(penPx(size));
  for (const { kind, places } of strokesOf(size)) {
    const [start = [0, 0], ...rest] = places;
    page.moveTo(...start);
    if (kind === 'straight') for (const place of rest) page.lineTo(...place);
    else {
      const [from = start, to = start, end = start] = rest;
      page.bezierCurveTo(...from, ...to, ...end);
    }
    page.stroke();
  }
  return finished(page);
}

/** The sheet as a scanner delivers it: one page that is one picture. */
export function scannedPdf(size: SheetSize, jpeg: Buffer): Promise<Buffer> {
  const page = pageOf(size);
  page.image(jpeg, 0, 0, { width: page.page.width, height: page.page.height });
  return finished(page);
}

function pageOf({ width, height, dpi }: SheetSize): PDFKit.PDFDocument {
  return new PDFDocument({ size: [(width * 72) / dpi, (height * 72) / dpi], margin: 0 });
}

function finished(page: PDFKit.PDFDocument): Promise<Buffer> {
  const bytes = buffer(page);
  page.end();
  return bytes;
}
