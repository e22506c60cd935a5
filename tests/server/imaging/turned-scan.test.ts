import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { needsDisk, setUpright, writeUpright } from '#server/imaging/turned-scan.ts';

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-turned-'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Wider and higher than a tile, and no multiple of one, every pixel its own. */
const [widthPx, heightPx] = [1300, 700];
const pixels = Buffer.alloc(widthPx * heightPx * 3);
for (let at = 0; at < pixels.length; at++) pixels[at] = (at * 7919) >> 5;
const stored = () => sharp(pixels, { raw: { width: widthPx, height: heightPx, channels: 3 } });

describe('a scan that was stored turned', () => {
  it.each([1, 2, 3, 4, 5, 6, 7, 8])(
    'stands upright by bands and in memory as a viewer shows orientation %i',
    async (orientation) => {
      const scan = { widthPx, heightPx, samples: 3, orientation } as const;
      // What the decoder itself makes of the same pixels under the same tag.
      const tagged = await stored().withMetadata({ orientation }).png().toBuffer();
      const shown = await sharp(tagged)
        .autoOrient()
        .removeAlpha()
        .raw()
        .toBuffer({ resolveWithObject: true });
      const file = path.join(folder, `${orientation}.tif`);
      await writeUpright(stored(), scan, file);
      const written = await sharp(file).raw().toBuffer({ resolveWithObject: true });
      expect([written.info.width, written.info.height]).toEqual([shown.info.width, shown.info.height]);
      expect(written.data.equals(shown.data)).toBe(true);
      expect((await (await setUpright(stored(), scan)).raw().toBuffer()).equals(shown.data)).toBe(true);
    },
  );

  it('leaves nothing but the upright file', () => {
    expect(readdirSync(folder).filter((name) => !/^\d\.tif$/.test(name))).toEqual([]);
  });

  it('is turned on disk only when memory would not do', () => {
    const a0 = { widthPx: 28_087, heightPx: 19_866, samples: 3, orientation: 6 } as const;
    expect(needsDisk(a0)).toBe(true);
    expect(needsDisk({ ...a0, orientation: 1 })).toBe(false);
    expect(needsDisk({ ...a0, widthPx: 4000, heightPx: 3000 })).toBe(false);
  });
});
