import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { crc32, deflateSync } from 'node:zlib';
import sharp, { type Sharp } from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';
import { g4Drawing } from '#tests/support/drawing-files.ts';

let folder: string;
let renderer: RenderProcess;
beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-image-'));
  renderer = createRenderProcess();
});
afterAll(() => {
  renderer.close();
  rmSync(folder, { recursive: true, force: true });
});

let count = 0;
async function render(bytes: Buffer, pageNumber = 1) {
  const file = path.join(folder, `${++count}`);
  writeFileSync(file, bytes);
  const { kind, pages } = await renderer.probe(file);
  const outFolder = path.join(folder, `${count}-tiles`);
  const sheet = await renderer.renderSheet({ file, kind, pageNumber, outFolder });
  const tile = (z: number, x: number, y: number) =>
    path.join(outFolder, `${z}`, `${x}_${y}.${sheet.tileFormat}`);
  return { sheet, pages, tile, outFolder };
}

/** A 1-bit PNG of any size, a few hundred kilobytes for a gigapixel. */
function whitePng(width: number, height: number): Buffer {
  const head = Buffer.alloc(13);
  head.writeUInt32BE(width, 0);
  head.writeUInt32BE(height, 4);
  head.writeUInt8(1, 8);
  const rows = deflateSync(Buffer.alloc((1 + Math.ceil(width / 8)) * height), { level: 1 });
  const signature = Buffer.from('\x89PNG\r\n\x1a\n', 'latin1');
  return Buffer.concat([signature, chunk('IHDR', head), chunk('IDAT', rows), chunk('IEND', Buffer.alloc(0))]);
}

function chunk(type: string, data: Buffer): Buffer {
  const named = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const [length, check] = [Buffer.alloc(4), Buffer.alloc(4)];
  length.writeUInt32BE(data.length);
  check.writeUInt32BE(crc32(named));
  return Buffer.concat([length, named, check]);
}

const plain = (width: number, height: number, background: string): Sharp =>
  sharp({ create: { width, height, channels: 3, background } });

/** First pixel of an image as stored, every channel. */
const firstPixel = async (file: string) => [
  ...(await sharp(file).toColourspace('srgb').raw().toBuffer()).subarray(0, 3),
];

describe('a scan', () => {
  it('with more pixels than can be shown is refused by its header, before anything is decoded', async () => {
    await expect(render(whitePng(40_000, 30_000))).rejects.toMatchObject({
      code: 'too-many-pixels',
      message: expect.stringContaining('40,000 × 30,000 pixels'),
    });
    expect(renderer.peakBytes()).toBeLessThan(400_000_000);
  });

  it('becomes a pyramid from one tile to full size, and nothing else', async () => {
    const { sheet, outFolder } = await render(await g4Drawing({ width: 2100, height: 600 }));
    // 2100 px: 2100 / 512 = 4.1, so three halvings until one tile holds it all.
    expect(sheet).toMatchObject({ widthPx: 2100, heightPx: 600, maxZoom: 3, tileFormat: 'png', dpi: 300 });
    expect(readdirSync(outFolder).sort()).toEqual(['0', '1', '2', '3', 'thumbnail.webp']);
    expect(readdirSync(path.join(outFolder, '3'))).toHaveLength(5 * 2);
  });

  it('that states no resolution has none, instead of the 72 dots that stand for it', async () => {
    const png = await plain(64, 64, '#ffffff').png().toBuffer();
    expect((await render(png)).sheet.dpi).toBeNull();
    const stated = await plain(64, 64, '#ffffff').withMetadata({ density: 400 }).png().toBuffer();
    expect((await render(stated)).sheet.dpi).toBe(400);
  });

  it.each([
    // Rows of a fax: 204 dots across, 98 or 196 down (ITU-T T.4).
    [204, 98, undefined, 400, 416],
    [204, 196, undefined, 400, 208],
    [100, 200, undefined, 800, 200],
    [204, 98, 6, 416, 400],
    [300, 300.5, undefined, 400, 200],
  ])(
    'of %d × %d dots per inch, orientation %s, is stretched to %i × %i',
    async (x, y, orientation, width, height) => {
      const tiff = await plain(400, 200, '#ffffff')
        .withMetadata(orientation ? { orientation } : {})
        .tiff({ compression: 'lzw', xres: x / 25.4, yres: y / 25.4 })
        .toBuffer();
      const { sheet } = await render(tiff);
      expect(sheet).toMatchObject({ widthPx: width, heightPx: height });
      expect(sheet.dpi).toBeCloseTo(Math.round(Math.max(x, x === 300 ? 300 : y)), -0.5);
      expect(sheet.note).toMatch(x === 300 ? /^$/ : /lengths are true/);
    },
  );

  it('in fax data that end half-way is refused, not shown with its lower half white', async () => {
    const tiff = await g4Drawing({ width: 512, height: 512 });
    // One strip or more: the last one's byte count is halved, as a scanner that ran out of memory leaves it.
    const directory = tiff.readUInt32LE(4);
    for (let index = 0; index < tiff.readUInt16LE(directory); index++) {
      const entry = directory + 2 + index * 12;
      if (tiff.readUInt16LE(entry) !== 279) continue;
      const count = tiff.readUInt32LE(entry + 4);
      const at = count === 1 ? entry + 8 : tiff.readUInt32LE(entry + 8) + 4 * (count - 1);
      tiff.writeUInt32LE(tiff.readUInt32LE(at) >> 1, at);
    }
    await expect(render(tiff)).rejects.toMatchObject({ code: 'damaged' });
  });

  it('in 12 bits stored as 16 is not shown black', async () => {
    const words = new Uint16Array(64 * 64).map((_, index) => (index % 64) * 64);
    const raw = { width: 64, height: 64, channels: 1 as const };
    const tiff = await sharp(words, { raw })
      .toColourspace('grey16')
      .tiff({ compression: 'deflate' })
      .toBuffer();
    const { tile } = await render(tiff);
    const { channels } = await sharp(tile(0, 0, 0)).stats();
    expect(channels[0]?.max).toBeGreaterThan(240);
    expect(channels[0]?.mean).toBeGreaterThan(100);
  });

  it('in CMYK keeps its paper white, and a transparent one is laid on white', async () => {
    const cmyk = await plain(64, 64, '#ffffff').toColourspace('cmyk').jpeg().toBuffer();
    expect(Math.min(...(await firstPixel((await render(cmyk)).tile(0, 0, 0))))).toBeGreaterThan(250);
    const clear = sharp({ create: { width: 64, height: 64, channels: 4, background: '#00000000' } });
    expect(await firstPixel((await render(await clear.png().toBuffer())).tile(0, 0, 0))).toEqual([
      255, 255, 255,
    ]);
  });

  it('with grain is cut into JPEG tiles, line work into PNG', async () => {
    const grain = { type: 'gaussian' as const, mean: 200, sigma: 12 };
    const noisy = sharp({
      create: { width: 600, height: 400, channels: 3, background: '#eee', noise: grain },
    });
    expect((await render(await noisy.png().toBuffer())).sheet.tileFormat).toBe('jpeg');
    expect(
      (await render(await plain(600, 400, '#eeeeee').webp({ lossless: true }).toBuffer())).sheet.tileFormat,
    ).toBe('png');
  });

  it('of several pages gives each its own sheet', async () => {
    const pages = await Promise.all(
      ['#ff0000', '#0000ff'].map((background) => plain(80, 60, background).png().toBuffer()),
    );
    const tiff = await sharp(pages, { join: { animated: true } })
      .tiff({ compression: 'lzw' })
      .toBuffer();
    expect((await render(tiff, 1)).pages).toHaveLength(2);
    expect(await firstPixel((await render(tiff, 1)).tile(0, 0, 0))).toEqual([255, 0, 0]);
    expect(await firstPixel((await render(tiff, 2)).tile(0, 0, 0))).toEqual([0, 0, 255]);
  });
});
