import { describe, expect, it } from 'vitest';
import {
  levelFor,
  levelScale,
  tileAbove,
  tileFrame,
  tilesIn,
} from '#client/features/desk/render/tile-grid.ts';

/** A sheet as the server cuts it: level 5 is full size, level 0 one tile. */
const sheet = {
  widthPx: 10_000,
  heightPx: 7_000,
  tiles: { rendition: 'base', tileSizePx: 512, maxZoom: 5, format: 'png' as const },
};

describe('the grid of tiles', () => {
  it('takes full size when a pixel of the sheet is a pixel of the screen, and stays within the pyramid', () => {
    expect(levelFor(sheet, 1)).toBe(5);
    expect(levelFor(sheet, 40)).toBe(5);
    expect(levelFor(sheet, 0.5)).toBe(4);
    expect(levelFor(sheet, 1e-6)).toBe(0);
  });

  it('takes the finest level there is while the sheet is being prepared', () => {
    const early = { ...sheet, tiles: { ...sheet.tiles, readyZoom: 3 } };
    expect(levelFor(early, 1)).toBe(3);
    expect(levelFor(early, 0.5)).toBe(3);
    expect(levelFor(early, 0.1)).toBe(levelFor(sheet, 0.1));
    // Levels are numbered as in the whole sheet, so that what stands in for a tile lies where the tile will.
    expect(levelScale(early, 3)).toBe(1 / 4);
  });

  it('is never coarser than the screen shows by more than a seventh', () => {
    for (let zoom = 0.02; zoom < 1; zoom *= 1.03) {
      expect(levelScale(sheet, levelFor(sheet, zoom)) / zoom).toBeGreaterThan(1 / 1.16);
    }
  });

  it('names the tiles in sight from the middle outwards and none beyond the sheet', () => {
    const tiles = tilesIn(sheet, 5, [-300, -300, 1400, 1400]);
    expect(tiles.map(({ x, y }) => `${x} ${y}`).sort()).toEqual([
      '0 0',
      '0 1',
      '0 2',
      '1 0',
      '1 1',
      '1 2',
      '2 0',
      '2 1',
      '2 2',
    ]);
    expect(tiles[0]).toEqual({ z: 5, x: 0, y: 0 });
    expect(tilesIn(sheet, 5, [9_800, 6_900, 4_000, 4_000], 1).every(({ x, y }) => x <= 19 && y <= 13)).toBe(
      true,
    );
  });

  it('finds what stands in for a tile on a coarser level', () => {
    const tile = { z: 5, x: 13, y: 9 };
    const above = tileAbove(tile, 3);
    expect(above).toEqual({ z: 3, x: 3, y: 2 });
    const [left, top, side] = tileFrame(sheet, above);
    const [x, y, fine] = tileFrame(sheet, tile);
    expect(x >= left && y >= top && x + fine <= left + side && y + fine <= top + side).toBe(true);
  });
});
