import { describe, expect, it } from 'vitest';
import { levelFor, tilesOf } from '#client/features/drawings/components/sheet-picture.tsx';
import type { SheetDto } from '#shared/contract/drawings.ts';

const sheet = (widthPx: number, heightPx: number, maxZoom: number): SheetDto => ({
  id: '01a231ba-52e0-737c-88ef-e8df196947ec',
  pageNumber: 1,
  widthPx,
  heightPx,
  dpi: 300,
  tiles: { rendition: 'base', tileSizePx: 512, maxZoom, format: 'png' },
  note: '',
});

describe('the picture of a whole sheet', () => {
  it('takes the full size of a small sheet', () => {
    expect(levelFor(sheet(400, 300, 0))).toBe(0);
    expect(levelFor(sheet(1600, 900, 2))).toBe(2);
  });

  it('takes the lowest level that is still wide enough', () => {
    // 9933 px / 4 = 2483 px is wide enough, / 8 = 1242 px is not.
    expect(levelFor(sheet(9933, 7016, 5))).toBe(3);
  });

  it('takes the finest level there is while the sheet is being prepared', () => {
    const early = sheet(9933, 7016, 5);
    early.tiles.readyZoom = 2;
    expect(levelFor(early)).toBe(2);
  });

  it('covers the sheet with its tiles exactly', () => {
    const tiles = tilesOf(sheet(9933, 7016, 5));
    const sum = (part: 'width' | 'height', row: string) =>
      tiles
        .filter((tile) => (part === 'width' ? tile.style.top === row : tile.style.left === row))
        .reduce((total, tile) => total + Number.parseFloat(tile.style[part]), 0);
    expect(tiles).toHaveLength(5 * 4);
    expect(sum('width', '0%')).toBeCloseTo(100, 9);
    expect(sum('height', '0%')).toBeCloseTo(100, 9);
  });
});
