import { OPS, type PDFPageProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { DEFAULT_DPI, MAX_DPI, MAX_PDF_PIXELS, MAX_PIXELS } from '#shared/contract/limits.ts';
import { mostDpi } from '#shared/contract/page-dpi.ts';

/** A raster covering less of the page than this is a stamp or a logo, not the drawing. */
const MAIN_SHARE = 0.5;

type Matrix = [number, number, number, number, number, number];

export interface ChosenDpi {
  dpi: number;
  note: string;
}

/**
 * Resolution for a page of `widthPt` × `heightPt` points: the finest main scan's own, 300 at least and 600 at most,
 * reduced until the page fits the pixel budget, which the note then tells.
 */
export function chooseDpi(
  widthPt: number,
  heightPt: number,
  scanDpi: number | null,
  asked?: number,
): ChosenDpi {
  const wanted = asked ?? Math.min(MAX_DPI, Math.max(DEFAULT_DPI, Math.round(scanDpi ?? 0)));
  // Drawn by bands a page needs no more memory for more pixels, but time: only who asks for them waits for them.
  const most = mostDpi(widthPt / 72, heightPt / 72, asked ? MAX_PIXELS : MAX_PDF_PIXELS);
  if (wanted <= most) return { dpi: wanted, note: '' };
  const dpi = Math.max(1, most);
  return {
    dpi,
    note: `Drawn at ${dpi} dots per inch instead of ${wanted}, because the page is very large. Upload the part with the section alone for a finer picture.`,
  };
}

/**
 * Dots per inch of the finest raster that covers at least half of the page; null when there is none. Reads the
 * page's operators, for which pdf.js decodes its pictures.
 */
export async function mainScanDpi(page: PDFPageProxy): Promise<number | null> {
  const { fnArray, argsArray } = await page.getOperatorList();
  const { width, height } = page.getViewport({ scale: 1 });
  const pageArea = (width * height) / (page.userUnit * page.userUnit);
  let finest: number | null = null;
  walk(fnArray, argsArray, (matrix, widthPx) => {
    const [a, b, c, d] = matrix;
    if (Math.abs(a * d - b * c) < MAIN_SHARE * pageArea) return;
    const dpi = (72 * widthPx) / (Math.hypot(a, b) * page.userUnit);
    finest = Math.max(finest ?? 0, dpi);
  });
  page.cleanup();
  return finest;
}

function walk(
  operators: number[],
  args: unknown[][],
  onPicture: (matrix: Matrix, widthPx: number) => void,
): void {
  let current: Matrix = [1, 0, 0, 1, 0, 0];
  const saved: Matrix[] = [];
  operators.forEach((operator, index) => {
    const given = args[index] ?? [];
    switch (operator) {
      case OPS.save:
        saved.push(current);
        break;
      case OPS.restore:
      case OPS.paintFormXObjectEnd:
        current = saved.pop() ?? current;
        break;
      case OPS.transform:
        current = multiplied(current, given);
        break;
      case OPS.paintFormXObjectBegin:
        saved.push(current);
        if (given[0]) current = multiplied(current, given[0] as unknown[]);
        break;
      case OPS.paintImageXObject:
        onPicture(current, Number(given[1]));
        break;
      case OPS.paintImageMaskXObject:
        onPicture(current, (given[0] as { width: number }).width);
        break;
    }
  });
}

function multiplied([a, b, c, d, e, f]: Matrix, by: unknown[]): Matrix {
  const [A = 1, B = 0, C = 0, D = 1, E = 0, F = 0] = by.map(Number);
  return [a * A + c * B, b * A + d * B, a * C + c * D, b * C + d * D, a * E + c * F + e, b * E + d * F + f];
}
