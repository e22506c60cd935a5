import { describe, expect, it } from 'vitest';
import { greyOf, type InkTiles, inkSheetOf } from '#client/features/desk/model/ink-tiles.ts';
import { type TilePlace, tileAddress } from '#client/features/desk/model/tile-address.ts';

const SHEET: InkTiles = {
  id: '019a3c00-0000-7000-8000-000000000001',
  widthPx: 1300,
  heightPx: 700,
  tiles: { rendition: 'base', tileSizePx: 512, maxZoom: 2, format: 'webp' },
};

/** Grey of a place that tells where it lies, whatever the tile. */
const toneAt = (x: number, y: number) => (x * 7 + y * 13) % 251;

function pictureOf({ z, x, y }: TilePlace) {
  const scale = 2 ** (2 - z);
  const width = Math.min(512, Math.ceil(1300 / scale) - x * 512);
  const height = Math.min(512, Math.ceil(700 / scale) - y * 512);
  const grey = new Uint8Array(width * height);
  for (let j = 0; j < height; j += 1) {
    for (let i = 0; i < width; i += 1) grey[j * width + i] = toneAt(x * 512 + i, y * 512 + j);
  }
  return { width, height, grey };
}

describe('the pixels of a sheet for following ink', () => {
  it('are put together of the tiles that a window meets, each fetched once', async () => {
    const asked: string[] = [];
    const sheet = inkSheetOf(SHEET, async (tile) => {
      asked.push(`${tile.z}/${tile.x}_${tile.y}`);
      return pictureOf(tile);
    });
    const { grey } = await sheet.window(0, [500, 500, 600, 180]);
    expect(asked.sort()).toEqual(['2/0_0', '2/0_1', '2/1_0', '2/1_1', '2/2_0', '2/2_1']);
    for (const [x, y] of [
      [500, 500],
      [511, 511],
      [512, 512],
      [1024, 600],
      [1099, 679],
    ] as const) {
      expect(grey[(y - 500) * 600 + x - 500]).toBe(toneAt(x, y));
    }
    await sheet.window(0, [900, 100, 300, 300]);
    expect(asked).toHaveLength(6);
  });

  it('come from the level asked for, halved as often', async () => {
    const asked: number[] = [];
    const sheet = inkSheetOf(SHEET, async (tile) => {
      asked.push(tile.z);
      return pictureOf(tile);
    });
    expect(sheet.halvings).toBe(2);
    const { grey } = await sheet.window(1, [600, 300, 50, 50]);
    expect(asked).toEqual([1]);
    expect(grey[0]).toBe(toneAt(600, 300));
  });

  it('of a tile that failed are asked for again', async () => {
    let tries = 0;
    const sheet = inkSheetOf(SHEET, async (tile) => {
      tries += 1;
      if (tries === 1) throw new Error('The tile answered 503.');
      return pictureOf(tile);
    });
    await expect(sheet.window(0, [0, 0, 100, 100])).rejects.toThrow('503');
    expect((await sheet.window(0, [0, 0, 100, 100])).grey[0]).toBe(toneAt(0, 0));
  });

  it('are grey by the eye’s weights', () => {
    const rgba = Uint8ClampedArray.from([0, 0, 0, 255, 255, 255, 255, 255, 200, 30, 30, 255]);
    expect([...greyOf(rgba)]).toEqual([0, 255, Math.floor((77 * 200 + 150 * 30 + 29 * 30) / 256)]);
  });

  it('are fetched where the sheet’s own tiles are', () => {
    expect(tileAddress(SHEET, { z: 2, x: 1, y: 0 })).toBe(
      '/api/v1/sheets/019a3c00-0000-7000-8000-000000000001/tiles/base/2/1_0',
    );
  });
});
