import type PDFKit from 'pdfkit';
import { INK } from './print-colours.ts';
import type { FontStyle, SheetFonts } from './sheet-fonts.ts';
import { type TextLine, textLines } from './text-lines.ts';

export type Doc = typeof PDFKit.prototype;
export type Paper = 'A4' | 'A3';

const PT_PER_MM = 72 / 25.4;
export const mm = (length: number) => length * PT_PER_MM;

/** Sizes in mm, upright. */
const SIZES: Record<Paper, [number, number]> = { A4: [210, 297], A3: [297, 420] };
export const MARGIN_MM = 14;
/** Kept free at the foot for page number, revision and hash. */
export const FOOT_MM = 10;
const GAP_MM = 10;

/** Size of a page in points. */
export function pageSize(paper: Paper, lies: boolean): [number, number] {
  const [short, long] = SIZES[paper];
  return lies ? [mm(long), mm(short)] : [mm(short), mm(long)];
}

/** A column on the present page into which blocks are set one below the other. */
export interface PageFlow {
  doc: Doc;
  fonts: SheetFonts;
  widthPt: number;
  /** Left edge of the present column. */
  x(): number;
  /** Where the next block begins. */
  y(): number;
  advance(heightPt: number): void;
  /** Goes to the next column or page unless so much height is left; a taller block begins at the top of one. */
  need(heightPt: number): void;
  /** Sets text lines and goes below them. */
  text(
    text: string,
    options?: { style?: FontStyle; sizePt?: number; colour?: string; indentPt?: number },
  ): void;
}

export const LEADING = 1.32;
export const TEXT_PT = 9;

/** Text pages: A4 upright with one column, A3 lying with two, so that lines stay of readable length. */
export function startTextPages(doc: Doc, fonts: SheetFonts, paper: Paper): PageFlow {
  const lies = paper === 'A3';
  const [pageWidth, pageHeight] = pageSize(paper, lies);
  const columns = lies ? 2 : 1;
  const widthPt = (pageWidth - 2 * mm(MARGIN_MM) - (columns - 1) * mm(GAP_MM)) / columns;
  const top = mm(MARGIN_MM);
  const bottom = pageHeight - mm(MARGIN_MM + FOOT_MM);
  let column = columns;
  let y = bottom;
  function next(): void {
    column += 1;
    if (column >= columns) {
      doc.addPage({ size: [pageWidth, pageHeight], margin: 0 });
      column = 0;
    }
    y = top;
  }
  const flow: PageFlow = {
    doc,
    fonts,
    widthPt,
    x: () => mm(MARGIN_MM) + column * (widthPt + mm(GAP_MM)),
    y: () => y,
    advance: (height) => {
      y += height;
    },
    need: (height) => {
      if (y + height > bottom && y > top) next();
    },
    text: (text, { style = 'plain', sizePt = TEXT_PT, colour = INK, indentPt = 0 } = {}) => {
      const height = sizePt * LEADING;
      for (const line of textLines(fonts, text, style, sizePt, widthPt - indentPt)) {
        flow.need(height);
        drawLine(doc, line, flow.x() + indentPt, y, sizePt, colour);
        y += height;
      }
    },
  };
  next();
  return flow;
}

/** Draws one line of text with its top at `y`. */
export function drawLine(doc: Doc, line: TextLine, x: number, y: number, sizePt: number, colour = INK): void {
  let at = x;
  const baseline = y + sizePt;
  doc.fillColor(colour);
  for (const run of line.runs) {
    doc
      .font(run.font)
      .fontSize(run.sizePt)
      .text(run.text, at, baseline - run.risePt, { lineBreak: false, baseline: 'alphabetic' });
    at += run.widthPt;
  }
}
