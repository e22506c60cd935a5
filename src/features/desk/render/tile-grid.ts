import type { SheetDto } from '#shared/contract/drawings.ts';
import type { SheetFrame, SheetSize } from '../model/viewport.ts';

export type Tile = { readonly z: number; readonly x: number; readonly y: number };
/** A raster in tiles; all frames here are in its pixels. */
export type TiledSheet = SheetSize & Pick<SheetDto, 'tiles'>;

/** How much smaller than the screen's own pixels a level may be before the next larger one is taken, in levels. */
const SOFTNESS = 0.2;

export function tileKey({ z, x, y }: Tile): string {
  return `${z}/${x}_${y}`;
}

/** Pixels of level `z` per sheet pixel. Each level halves the one above it. */
export function levelScale(sheet: TiledSheet, z: number): number {
  return 2 ** (z - sheet.tiles.maxZoom);
}

/** The level that is sharp at so many device pixels per sheet pixel, and no larger than needed; the finest there is. */
export function levelFor(sheet: TiledSheet, devicePxPerSheetPx: number): number {
  const exact = sheet.tiles.maxZoom + Math.log2(devicePxPerSheetPx);
  const { maxZoom, readyZoom = maxZoom } = sheet.tiles;
  return Math.min(readyZoom, Math.max(0, Math.ceil(exact - SOFTNESS)));
}

/** What a tile shows, `[left, top, width, height]` in sheet pixels; not cut at the sheet's edge. */
export function tileFrame(sheet: TiledSheet, tile: Tile): SheetFrame {
  const side = sheet.tiles.tileSizePx / levelScale(sheet, tile.z);
  return [tile.x * side, tile.y * side, side, side];
}

/** Tiles of a level that show a part of a frame, `ring` tiles more on each side, nearest to its middle first. */
export function tilesIn(sheet: TiledSheet, z: number, frame: SheetFrame, ring = 0): Tile[] {
  const side = sheet.tiles.tileSizePx / levelScale(sheet, z);
  const [left, top, width, height] = frame;
  const lastX = Math.ceil(sheet.widthPx / side) - 1;
  const lastY = Math.ceil(sheet.heightPx / side) - 1;
  const fromX = Math.max(0, Math.floor(left / side) - ring);
  const toX = Math.min(lastX, Math.floor((left + width) / side) + ring);
  const fromY = Math.max(0, Math.floor(top / side) - ring);
  const toY = Math.min(lastY, Math.floor((top + height) / side) + ring);
  const tiles: Tile[] = [];
  for (let y = fromY; y <= toY; y += 1) for (let x = fromX; x <= toX; x += 1) tiles.push({ z, x, y });
  const middleX = (left + width / 2) / side - 0.5;
  const middleY = (top + height / 2) / side - 0.5;
  const far = (tile: Tile) => Math.hypot(tile.x - middleX, tile.y - middleY);
  return tiles.sort((a, b) => far(a) - far(b));
}

/** The tile of a lower level that shows what a tile shows. */
export function tileAbove(tile: Tile, z: number): Tile {
  const shift = 2 ** (tile.z - z);
  return { z, x: Math.floor(tile.x / shift), y: Math.floor(tile.y / shift) };
}
