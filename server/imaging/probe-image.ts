import { MAX_PAGES } from '#shared/contract/limits.ts';
import { readHeader, statedDpi } from './image-source.ts';
import { isPlainLab } from './lab-tiff.ts';
import { RenderRefusal, refusals } from './refusal.ts';
import type { ProbedPage } from './render-types.ts';
import type { FileKind } from './sniff.ts';
import { readTiffPages, type TiffPage } from './tiff-directory.ts';

const OLD_JPEG = 6;

/** The pages of an image file; a file of which no page can be drawn is refused whole. @throws RenderRefusal */
export async function probeImage(file: string, kind: FileKind): Promise<ProbedPage[]> {
  if (kind !== 'tiff') return [await probePage(file, 1)];
  const directories = await readTiffPages(file);
  if (directories.length === 0) throw refusals.noPages();
  if (directories.length > MAX_PAGES) throw refusals.tooManyPages(directories.length, MAX_PAGES);
  const pages: ProbedPage[] = [];
  for (const [index, directory] of directories.entries()) {
    pages.push(await probeTiffPage(file, index + 1, directory));
  }
  const [first] = pages;
  if (first?.refusal && pages.every((page) => page.refusal)) {
    throw new RenderRefusal(first.refusal.code, first.refusal.message);
  }
  return pages;
}

async function probePage(file: string, pageNumber: number): Promise<ProbedPage> {
  const header = await readHeader(file, pageNumber);
  const { width, height } = header.autoOrient;
  return { pageNumber, width, height, unit: 'px', dpi: statedDpi(header), refusal: null };
}

async function probeTiffPage(file: string, pageNumber: number, directory: TiffPage): Promise<ProbedPage> {
  const size = { width: directory.widthPx, height: directory.heightPx };
  try {
    if (isPlainLab(directory)) return { pageNumber, ...size, unit: 'px', dpi: null, refusal: null };
    // libvips decodes old-style JPEG to nonsense and calls it a success below its strictest setting.
    if (directory.compression === OLD_JPEG) throw refusals.damagedImage('old-style JPEG in TIFF');
    return await probePage(file, pageNumber);
  } catch (error) {
    if (!(error instanceof RenderRefusal)) throw error;
    const refusal = { code: error.code, message: error.message };
    return { pageNumber, ...size, unit: 'px', dpi: null, refusal };
  }
}
