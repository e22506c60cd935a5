import { rm } from 'node:fs/promises';
import { drawBand } from './draw-band.ts';
import { openPage, withPdf } from './pdf-document.ts';
import { hasEmptyPictures, writeStandIns } from './pdf-empty-pictures.ts';
import { RenderRefusal } from './refusal.ts';
import { takeWarnings } from './render-log.ts';
import type { RenderedSheet, RenderRequest } from './render-types.ts';

/** Longer side of the small drawing that shows which pictures a page uses. */
const TRIAL_PX = 64;
const NOTE =
  'A picture on this page has no data in the file and is left blank. Compare the sheet with the original; if ' +
  'something is missing, ask for another copy of the file.';

/**
 * Renders a page; a picture on it that has no data at all is left blank, which the note of the sheet tells. Left to
 * the renderer it would be a damaged picture in one coding and silently white in another. @throws RenderRefusal
 */
export async function withoutEmptyPictures(
  request: RenderRequest,
  render: (request: RenderRequest) => Promise<RenderedSheet>,
): Promise<RenderedSheet> {
  if (!(await hasEmptyPictures(request.file))) return render(request);
  const file = `${request.outFolder}.pdf`;
  try {
    await writeStandIns(request.file, file, 'undecodable');
    const isShown = await isFaulty(file, request.pageNumber);
    // Also for a page that only names the picture: the renderer warns of an empty stream as soon as it meets one.
    await writeStandIns(request.file, file, 'nothing');
    const sheet = await render({ ...request, file });
    return isShown ? { ...sheet, note: [NOTE, sheet.note].filter(Boolean).join(' ') } : sheet;
  } finally {
    await rm(file, { force: true });
  }
}

async function isFaulty(file: string, pageNumber: number): Promise<boolean> {
  try {
    await withPdf(file, async (document) => {
      const page = await openPage(document, pageNumber);
      const full = page.getViewport({ scale: 1 });
      const viewport = page.getViewport({ scale: TRIAL_PX / Math.max(full.width, full.height) });
      takeWarnings();
      await drawBand(page, viewport, Math.ceil(viewport.width), Math.ceil(viewport.height));
    });
    return false;
  } catch (error) {
    if (error instanceof RenderRefusal) return true;
    throw error;
  }
}
