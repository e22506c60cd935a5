import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { type PDFDict, PDFDocument, PDFName } from 'pdf-lib';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';

/** Points; drawn at 72 dots per inch, so pixels as well. */
const SIDE = 200;

let folder: string;
let renderer: RenderProcess;
let jpeg: Buffer;
beforeAll(async () => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-empty-'));
  renderer = createRenderProcess();
  jpeg = await sharp({ create: { width: 40, height: 40, channels: 3, background: '#000' } })
    .jpeg()
    .toBuffer();
});
afterAll(() => {
  renderer.close();
  rmSync(folder, { recursive: true, force: true });
});

interface Picture {
  data: Uint8Array;
  filter?: string;
  side?: number;
}

/** Pictures beside each other, each a quarter of the page wide, above a black bar. */
async function pageOf(pictures: Picture[], { hide = -1 } = {}): Promise<Uint8Array> {
  const document = await PDFDocument.create();
  const page = document.addPage([SIDE, SIDE]);
  const named: Record<string, ReturnType<typeof document.context.register>> = {};
  const painted = pictures.map(({ data, filter = 'DCTDecode', side = 40 }, index) => {
    const stream = document.context.stream(data, {
      Type: 'XObject',
      Subtype: 'Image',
      Width: side,
      Height: side,
      ColorSpace: filter === 'CCITTFaxDecode' ? 'DeviceGray' : 'DeviceRGB',
      BitsPerComponent: filter === 'CCITTFaxDecode' ? 1 : 8,
      Filter: filter,
    });
    named[`I${index}`] = document.context.register(stream);
    return index === hide ? '' : `q 50 0 0 50 ${50 * index} 100 cm /I${index} Do Q`;
  });
  const content = document.context.stream(`${painted.join('\n')}\n0 0 ${SIDE} 20 re f`);
  page.node.set(PDFName.of('Contents'), document.context.register(content));
  page.node.set(PDFName.of('Resources'), document.context.obj({ XObject: named }) as PDFDict);
  return document.save();
}

let count = 0;
async function rendered(pdf: Uint8Array) {
  const file = path.join(folder, 'page.pdf');
  const outFolder = path.join(folder, String(++count));
  writeFileSync(file, pdf);
  try {
    const sheet = await renderer.renderSheet({ file, kind: 'pdf', pageNumber: 1, outFolder, dpi: 72 });
    const pixels = await sharp(path.join(outFolder, 'thumbnail.webp'))
      .resize(SIDE, SIDE)
      .greyscale()
      .raw()
      .toBuffer();
    return { sheet, brightness: (x: number, y: number) => pixels[y * SIDE + x] };
  } finally {
    rmSync(outFolder, { recursive: true, force: true });
  }
}

describe('a picture without any data', () => {
  it.each(['DCTDecode', 'FlateDecode', 'CCITTFaxDecode', 'JPXDecode', 'JBIG2Decode'])(
    'is left blank, and the sheet says so: %s',
    async (filter) => {
      const { sheet, brightness } = await rendered(await pageOf([{ data: new Uint8Array(), filter }]));
      expect(sheet.note).toMatch(/^A picture on this page has no data in the file and is left blank\./);
      expect(brightness(25, 75)).toBeGreaterThan(250);
      expect(brightness(100, 190)).toBeLessThan(5);
    },
  );

  it('is also one with fewer bytes than any JPEG has', async () => {
    const { sheet } = await rendered(await pageOf([{ data: Buffer.from('1234') }]));
    expect(sheet.note).toContain('left blank');
  });

  it('leaves the pictures beside it as they are', async () => {
    const { sheet, brightness } = await rendered(await pageOf([{ data: new Uint8Array() }, { data: jpeg }]));
    expect(sheet.note).toContain('left blank');
    expect(brightness(25, 75)).toBeGreaterThan(250);
    expect(brightness(75, 75)).toBeLessThan(5);
  });

  it('is no excuse for a damaged picture beside it', async () => {
    const cut = { data: jpeg.subarray(0, jpeg.length >> 1) };
    await expect(rendered(await pageOf([{ data: new Uint8Array() }, cut]))).rejects.toMatchObject({
      code: 'damaged',
    });
    await expect(rendered(await pageOf([{ data: Buffer.alloc(300, 'x') }]))).rejects.toMatchObject({
      code: 'damaged',
    });
  });

  it.each(['FlateDecode', 'DCTDecode'])('makes no note on a page that only names it: %s', async (filter) => {
    const pictures = [{ data: jpeg }, { data: new Uint8Array(), filter }];
    const shown = await pageOf(pictures);
    const hidden = await pageOf(pictures, { hide: 1 });
    expect((await rendered(shown)).sheet.note).toContain('left blank');
    const { sheet, brightness } = await rendered(hidden);
    expect(sheet.note).toBe('');
    expect(brightness(25, 75)).toBeLessThan(5);
  });

  it('makes no note on a page without one, and leaves no file behind', async () => {
    const { sheet, brightness } = await rendered(await pageOf([{ data: jpeg }]));
    expect(sheet.note).toBe('');
    expect(brightness(25, 75)).toBeLessThan(5);
    expect(readdirSync(folder)).toEqual(['page.pdf']);
  });
});
