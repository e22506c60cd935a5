import PDFDocument from 'pdfkit';
import type { SheetContent } from '#shared/text/calculation-sheet/content.ts';
import { drawChapter } from './draw-blocks.ts';
import { drawSectionPage } from './draw-section.ts';
import { type Doc, drawLine, MARGIN_MM, mm, type Paper, startTextPages } from './page-flow.ts';
import { GREY } from './print-colours.ts';
import { createSheetFonts, type SheetFonts } from './sheet-fonts.ts';
import { textLines } from './text-lines.ts';

export interface SheetPdfRequest {
  content: SheetContent;
  paper: Paper;
  /** The scan under the figure's crop as JPEG; null when there is none to show. */
  scan: Buffer | null;
  /** The moment the sheet speaks of. It is the only date in the file, so that two runs give the same bytes. */
  madeAt: Date;
}

/** Makes the PDF of a calculation sheet. The same request gives the same bytes. */
export async function renderSheetPdf({ content, paper, scan, madeAt }: SheetPdfRequest): Promise<Buffer> {
  const doc = new PDFDocument({
    autoFirstPage: false,
    bufferPages: true,
    lang: content.language,
    displayTitle: true,
    pdfVersion: '1.7',
    info: {
      Title: content.title,
      Subject: content.subject,
      Author: content.author,
      Creator: 'Tracehead',
      CreationDate: madeAt,
      ModDate: madeAt,
    },
  });
  const chunks: Buffer[] = [];
  const finished = new Promise<void>((resolve, reject) => {
    doc.on('data', (chunk: Buffer) => chunks.push(chunk));
    doc.on('end', resolve);
    doc.on('error', reject);
  });
  const fonts = createSheetFonts(doc);
  drawSectionPage(doc, fonts, paper, content, scan);
  const flow = startTextPages(doc, fonts, paper);
  drawContents(flow, content);
  for (const chapter of content.chapters) drawChapter(flow, chapter);
  drawEachPage(doc, fonts, content);
  doc.end();
  await finished;
  return Buffer.concat(chunks);
}

/** The list of chapters, each a link to its place. */
function drawContents(flow: ReturnType<typeof startTextPages>, { chapters, title }: SheetContent): void {
  flow.text(title, { style: 'bold', sizePt: 13 });
  flow.advance(4);
  for (const chapter of chapters) {
    const top = flow.y();
    flow.text(chapter.title, { colour: '#0f6b66' });
    flow.doc.goTo(flow.x(), top, flow.widthPt, flow.y() - top, chapter.id);
  }
  flow.advance(6);
}

/** Page n of m, revision and hash at the foot; DRAFT across each page of a draft. */
function drawEachPage(doc: Doc, fonts: SheetFonts, { foot, isDraft }: SheetContent): void {
  const { start, count } = doc.bufferedPageRange();
  for (let page = start; page < start + count; page += 1) {
    doc.switchToPage(page);
    const y = doc.page.height - mm(MARGIN_MM);
    const [left] = textLines(fonts, foot, 'plain', 7, doc.page.width);
    const [right] = textLines(fonts, `Page ${page - start + 1} of ${count}`, 'plain', 7, mm(60));
    if (left) drawLine(doc, left, mm(MARGIN_MM), y, 7, GREY);
    if (right) drawLine(doc, right, doc.page.width - mm(MARGIN_MM) - right.widthPt, y, 7, GREY);
    if (isDraft) drawDraft(doc, fonts);
  }
}

function drawDraft(doc: Doc, fonts: SheetFonts): void {
  const { width, height } = doc.page;
  const size = Math.min(width, height) / 3;
  const [line] = textLines(fonts, 'DRAFT', 'bold', size, width * 2);
  if (!line) return;
  doc
    .save()
    .rotate((-Math.atan2(height, width) * 180) / Math.PI, { origin: [width / 2, height / 2] })
    .fillOpacity(0.13);
  drawLine(doc, line, (width - line.widthPt) / 2, (height - size * 1.3) / 2, size, '#a8472b');
  doc.restore().fillOpacity(1);
}
