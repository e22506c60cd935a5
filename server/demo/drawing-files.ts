import PDFDocument from 'pdfkit';
import sharp from 'sharp';
import { drawSectionBB, drawSectionCC, sectionBB, sectionCC } from './embankment.ts';
import { drawRaisingScheme, raisingFrame } from './raising-scheme.ts';
import { scanOf } from './scan-paper.ts';
import type { SheetFrame } from './sheet-frame.ts';
import { drawSpillwayApron, spillwayFrame } from './spillway-apron.ts';

const scan = (svg: string, frame: SheetFrame, seed: number) =>
  scanOf(svg, frame.widthPx, frame.heightPx, seed);

/** HF-114, two cross-sections scanned into one TIFF of two pages of the same size. */
export async function crossSectionsTiff(): Promise<Buffer> {
  const pages = await Promise.all([
    scan(drawSectionBB(), sectionBB, 1).then((image) => image.png({ compressionLevel: 1 }).toBuffer()),
    scan(drawSectionCC(), sectionCC, 2).then((image) => image.png({ compressionLevel: 1 }).toBuffer()),
  ]);
  return sharp(pages, { join: { animated: true } })
    .tiff({ compression: 'jpeg', quality: 88, xres: 300 / 25.4, yres: 300 / 25.4 })
    .toBuffer();
}

/** HF-120, the spillway apron as a JPEG. */
export async function spillwayJpeg(): Promise<Buffer> {
  return (await scan(drawSpillwayApron(), spillwayFrame, 3)).jpeg({ quality: 88 }).toBuffer();
}

/** HF-131, three stages of a raising as a scanned PDF, a page each. */
export async function raisingPdf(): Promise<Buffer> {
  const pages = await Promise.all(
    [1, 2, 3].map(async (page) =>
      (await scan(drawRaisingScheme(page), raisingFrame, 10 + page)).jpeg({ quality: 85 }).toBuffer(),
    ),
  );
  const points = (px: number) => (px / 300) * 72;
  const size: [number, number] = [points(raisingFrame.widthPx), points(raisingFrame.heightPx)];
  const pdf = new PDFDocument({ size, margin: 0, autoFirstPage: false });
  const chunks: Buffer[] = [];
  pdf.on('data', (chunk: Buffer) => chunks.push(chunk));
  const finished = new Promise<void>((resolve) => pdf.on('end', resolve));
  for (const page of pages) pdf.addPage({ size, margin: 0 }).image(page, 0, 0, { width: size[0] });
  pdf.end();
  await finished;
  return Buffer.concat(chunks);
}
