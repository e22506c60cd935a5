import type { PDFDocumentProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { MAX_PAGES } from '#shared/contract/limits.ts';
import { openPage, withPdf } from './pdf-document.ts';
import { hasPdfEnd } from './pdf-end.ts';
import { refuseUnsoundPdf } from './pdf-soundness.ts';
import { RenderRefusal, refusals } from './refusal.ts';
import type { ProbedPage } from './render-types.ts';

/** The pages of a PDF; one that is cut off, or of which no page can be drawn, is refused whole. @throws RenderRefusal */
export async function probePdf(file: string): Promise<ProbedPage[]> {
  if (!(await hasPdfEnd(file))) throw refusals.pdfCutOff();
  return withPdf(file, async (document) => {
    if (document.numPages < 1) throw refusals.noPages();
    if (document.numPages > MAX_PAGES) throw refusals.tooManyPages(document.numPages, MAX_PAGES);
    await refuseUnsoundPdf(file, document.numPages);
    const pages: ProbedPage[] = [];
    for (let pageNumber = 1; pageNumber <= document.numPages; pageNumber++) {
      pages.push(await probePage(document, pageNumber));
    }
    const [first] = pages;
    if (first?.refusal && pages.every((page) => page.refusal)) {
      throw new RenderRefusal(first.refusal.code, first.refusal.message);
    }
    return pages;
  });
}

async function probePage(document: PDFDocumentProxy, pageNumber: number): Promise<ProbedPage> {
  try {
    const page = await openPage(document, pageNumber);
    const { width, height } = page.getViewport({ scale: 1 });
    page.cleanup();
    return { pageNumber, width, height, unit: 'pt', dpi: null, refusal: null };
  } catch (error) {
    if (!(error instanceof RenderRefusal)) throw error;
    const refusal = { code: error.code, message: error.message };
    return { pageNumber, width: 0, height: 0, unit: 'pt', dpi: null, refusal };
  }
}
