import { createRequire } from 'node:module';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { getDocument, type PDFDocumentProxy, type PDFPageProxy } from 'pdfjs-dist/legacy/build/pdf.mjs';
import { MAX_PDF_PIXELS } from '#shared/contract/limits.ts';
import { RenderRefusal, refusals } from './refusal.ts';

const assets = path.dirname(createRequire(import.meta.url).resolve('pdfjs-dist/package.json'));

/** Opens a PDF, runs `use` and closes it. Nothing is fetched, no script in it runs. @throws RenderRefusal */
export async function withPdf<T>(file: string, use: (document: PDFDocumentProxy) => Promise<T>): Promise<T> {
  const task = getDocument({
    // By address, so that only the parts a page needs are read into memory.
    url: pathToFileURL(file).href,
    disableAutoFetch: true,
    disableStream: true,
    rangeChunkSize: 2 ** 20,
    // Plain paths: without the first, JPEG 2000 scans come out blank and count as a success.
    wasmUrl: `${assets}/wasm/`,
    cMapUrl: `${assets}/cmaps/`,
    standardFontDataUrl: `${assets}/standard_fonts/`,
    iccUrl: `${assets}/iccs/`,
    isEvalSupported: false,
    enableXfa: false,
    useSystemFonts: false,
    maxImageSize: MAX_PDF_PIXELS,
    verbosity: 1,
  });
  try {
    const document = await task.promise.catch(refuseOpening);
    return await use(document);
  } finally {
    await task.destroy();
  }
}

function refuseOpening(error: unknown): never {
  if (error instanceof Error && error.name === 'PasswordException') throw refusals.encrypted();
  throw refusals.damagedPdf(error);
}

/** The page, with a size one can draw. @throws RenderRefusal */
export async function openPage(document: PDFDocumentProxy, pageNumber: number): Promise<PDFPageProxy> {
  const page = await document.getPage(pageNumber).catch((error: unknown) => {
    throw error instanceof RenderRefusal ? error : refusals.damagedPdf(error);
  });
  const { width, height } = page.getViewport({ scale: 1 });
  const usable = Number.isFinite(width) && Number.isFinite(height) && Math.min(width, height) >= 1;
  if (!usable) throw refusals.pageSize();
  return page;
}
