import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { createPngWriter } from '#client/lib/png-writer.ts';

/** A picture whose every pixel tells its place. */
function pixels(width: number, fromRow: number, rows: number): Uint8ClampedArray {
  const rgba = new Uint8ClampedArray(width * rows * 4);
  for (let y = 0; y < rows; y += 1)
    for (let x = 0; x < width; x += 1)
      rgba.set([x % 256, (fromRow + y) % 256, (x * 7 + (fromRow + y) * 13) % 256, 255], (y * width + x) * 4);
  return rgba;
}

async function written(width: number, height: number, band: number, dpi: number): Promise<Buffer> {
  const png = createPngWriter(width, height, dpi);
  for (let row = 0; row < height; row += band)
    await png.rows(pixels(width, row, Math.min(band, height - row)));
  return Buffer.from(await (await png.end()).arrayBuffer());
}

describe('a PNG written in bands', () => {
  it('decodes to the pixels given, whatever the bands', async () => {
    for (const band of [1, 7, 64, 301]) {
      const { data, info } = await sharp(await written(233, 301, band, 150))
        .raw()
        .toBuffer({ resolveWithObject: true });
      expect(info).toMatchObject({ width: 233, height: 301, channels: 3 });
      const asked = pixels(233, 0, 301);
      const wrong = data.findIndex((value, i) => value !== asked[Math.floor(i / 3) * 4 + (i % 3)]);
      expect(wrong).toBe(-1);
    }
  });

  it('says its resolution, to a pixel per metre', async () => {
    for (const dpi of [96, 150, 300]) {
      const metadata = await sharp(await written(10, 4, 4, dpi)).metadata();
      expect(metadata.density).toBe(dpi);
    }
  });

  it('is not handed out with rows missing', async () => {
    const png = createPngWriter(10, 8, 96);
    await png.rows(pixels(10, 0, 4));
    await expect(png.end()).rejects.toThrow(/8 rows was given 4/);
  });
});
