import type { SheetPoint } from '#shared/contract/document.ts';
import type { SheetContent } from '#shared/text/calculation-sheet/content.ts';
import { placeFigureLabels } from '#shared/text/calculation-sheet/figure-labels.ts';
import type { SectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';
import { LINE_LOOKS, labelColour, POINT_COLOUR } from './line-looks.ts';
import { type Doc, drawLine, FOOT_MM, LEADING, MARGIN_MM, mm, type Paper, pageSize } from './page-flow.ts';
import { GREY, INK } from './print-colours.ts';
import type { SheetFonts } from './sheet-fonts.ts';
import { textLines } from './text-lines.ts';

const LABEL_PT = 7;
const BLOCK_MM: Record<Paper, number> = { A4: 62, A3: 78 };
/** Below the figure, for scale bars and direction of flow. */
const BELOW_MM = 16;

export interface FigurePlace {
  x: number;
  y: number;
  /** Points on paper per sheet pixel. */
  scale: number;
  widthPt: number;
  heightPt: number;
}

/** Where the figure lies on the lying first page: as large as fits beside the title block. */
export function figurePlace(paper: Paper, crop: SectionFigure['crop']): FigurePlace {
  const [pageWidth, pageHeight] = pageSize(paper, true);
  const width = pageWidth - mm(2 * MARGIN_MM + BLOCK_MM[paper] + 5);
  const height = pageHeight - mm(2 * MARGIN_MM + FOOT_MM + BELOW_MM + 9);
  const scale = Math.min(width / crop[2], height / crop[3]);
  return {
    x: mm(MARGIN_MM),
    y: mm(MARGIN_MM + 9),
    scale,
    widthPt: crop[2] * scale,
    heightPt: crop[3] * scale,
  };
}

/** The first page: the scan with the traces over it, and the title block. */
export function drawSectionPage(
  doc: Doc,
  fonts: SheetFonts,
  paper: Paper,
  content: SheetContent,
  scan: Buffer | null,
): void {
  doc.addPage({ size: pageSize(paper, true), margin: 0 });
  doc.outline.addItem('Section');
  const say = teller(doc, fonts);
  say(content.title, mm(MARGIN_MM), mm(MARGIN_MM), {
    sizePt: 12,
    style: 'bold',
    widthPt: doc.page.width - mm(2 * MARGIN_MM),
  });
  drawTitleBlock(doc, fonts, paper, content);
  const { figure } = content;
  if (figure === null) {
    say('Nothing is traced yet, so there is no section to show.', mm(MARGIN_MM), mm(MARGIN_MM + 12), {});
    return;
  }
  const place = figurePlace(paper, figure.crop);
  doc.save().rect(place.x, place.y, place.widthPt, place.heightPt).clip();
  if (scan) doc.image(scan, place.x, place.y, { width: place.widthPt, height: place.heightPt });
  drawTraces(doc, figure, place);
  drawLabels(doc, fonts, figure, place);
  doc.restore();
  doc.lineWidth(0.6).strokeColor(INK).rect(place.x, place.y, place.widthPt, place.heightPt).stroke();
  drawBelow(doc, say, figure, place);
}

interface SayOptions {
  sizePt?: number;
  style?: 'plain' | 'bold';
  colour?: string;
  widthPt?: number;
}
type Say = (text: string, x: number, y: number, options: SayOptions) => number;

/** Sets text with its top at a place; gives the height taken. */
const teller =
  (doc: Doc, fonts: SheetFonts): Say =>
  (text, x, y, { sizePt = LABEL_PT, style = 'plain', colour = INK, widthPt = mm(80) }) => {
    const lines = textLines(fonts, text, style, sizePt, widthPt);
    lines.forEach((line, i) => {
      drawLine(doc, line, x, y + i * sizePt * LEADING, sizePt, colour);
    });
    return lines.length * sizePt * LEADING;
  };

function drawTraces(doc: Doc, figure: SectionFigure, place: FigurePlace): void {
  const [left, top] = figure.crop;
  const on = ([x, y]: SheetPoint): [number, number] => [
    place.x + (x - left) * place.scale,
    place.y + (y - top) * place.scale,
  ];
  const path = (points: readonly SheetPoint[]) =>
    points.forEach((point, i) => {
      const [x, y] = on(point);
      if (i === 0) doc.moveTo(x, y);
      else doc.lineTo(x, y);
    });
  for (const line of figure.lines) {
    const { colour, widthPt, dashPt } = LINE_LOOKS[line.kind];
    doc.save().lineWidth(widthPt).strokeColor(colour).lineJoin('round');
    if (dashPt.length > 0) doc.dash([...dashPt] as unknown as number);
    path(line.points);
    doc.stroke().restore();
  }
  doc.lineWidth(0.8).strokeColor(POINT_COLOUR);
  for (const profile of figure.profiles) {
    path(profile);
    doc.stroke();
  }
  for (const { at } of figure.knownPoints) {
    const [x, y] = on(at);
    doc
      .lineWidth(0.7)
      .strokeColor(INK)
      .moveTo(x - 4, y)
      .lineTo(x + 4, y)
      .moveTo(x, y - 4)
      .lineTo(x, y + 4)
      .stroke();
  }
  for (const { at } of figure.points) {
    const [x, y] = on(at);
    doc.lineWidth(0.9).strokeColor(POINT_COLOUR).circle(x, y, 2.4).stroke();
  }
}

/** Names and heads, each on a pale ground, so that it can be read over the scan. */
function drawLabels(doc: Doc, fonts: SheetFonts, figure: SectionFigure, place: FigurePlace): void {
  const lineOf = (text: string) => textLines(fonts, text, 'plain', LABEL_PT, Number.POSITIVE_INFINITY)[0]!;
  const setting = { scale: place.scale, letters: LABEL_PT, widthOf: (text: string) => lineOf(text).widthPt };
  for (const { text, of, left, top, width, height, baseLine } of placeFigureLabels(figure, setting)) {
    const line = lineOf(text);
    const [x, y] = [place.x + left, place.y + top];
    doc.save().fillColor('#ffffff', 0.8).rect(x, y, width, height).fill().restore();
    doc.fillOpacity(1);
    const at = [x + (width - line.widthPt) / 2, place.y + baseLine - LABEL_PT] as const;
    drawLine(doc, line, ...at, LABEL_PT, labelColour(of));
  }
}

function drawBelow(doc: Doc, say: Say, figure: SectionFigure, place: FigurePlace): void {
  let x = place.x;
  const y = place.y + place.heightPt + mm(5);
  for (const bar of figure.scaleBars) {
    const length = bar.lengthPx * place.scale;
    doc.lineWidth(0.8).strokeColor(INK).rect(x, y, length, 4).stroke();
    doc
      .fillColor(INK)
      .rect(x, y, length / 2, 4)
      .fill();
    say('0', x - 2, y + 5, {});
    say(bar.label, x + length - 4, y + 5, {});
    x += length + mm(34);
  }
  if (figure.flow === null) return;
  const [from, to] = figure.flow === 'right' ? [x, x + mm(18)] : [x + mm(18), x];
  const back = figure.flow === 'right' ? -6 : 6;
  doc
    .lineWidth(1)
    .strokeColor(INK)
    .moveTo(from, y + 2)
    .lineTo(to, y + 2)
    .stroke();
  doc
    .fillColor(INK)
    .polygon([to, y + 2], [to + back, y - 1], [to + back, y + 5])
    .fill();
  say('direction of flow', x, y + 7, {});
}

function drawTitleBlock(doc: Doc, fonts: SheetFonts, paper: Paper, { titleBlock }: SheetContent): void {
  const width = mm(BLOCK_MM[paper]);
  const x = doc.page.width - mm(MARGIN_MM) - width;
  const top = mm(MARGIN_MM + 9);
  const label = width * 0.3;
  let y = top;
  for (const cell of titleBlock) {
    const names = textLines(fonts, cell.label, 'plain', LABEL_PT, label - 6);
    const values = textLines(fonts, cell.value, 'plain', LABEL_PT + 0.5, width - label - 6);
    const height = Math.max(names.length, values.length) * (LABEL_PT + 0.5) * LEADING + 4;
    names.forEach((line, i) => {
      drawLine(doc, line, x + 3, y + 2 + i * LABEL_PT * LEADING, LABEL_PT, GREY);
    });
    values.forEach((line, i) => {
      drawLine(doc, line, x + label, y + 2 + i * (LABEL_PT + 0.5) * LEADING, LABEL_PT + 0.5);
    });
    y += height;
    doc
      .lineWidth(0.4)
      .strokeColor(INK)
      .moveTo(x, y)
      .lineTo(x + width, y)
      .stroke();
  }
  doc
    .lineWidth(0.9)
    .rect(x, top, width, y - top)
    .stroke();
}
