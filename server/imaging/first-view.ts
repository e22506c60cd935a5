import type { Sharp } from 'sharp';
import { TILE_SIZE_PX } from '#shared/contract/limits.ts';
import type { FirstView, RenderedSheet } from './render-types.ts';
import { cutTiles, maxZoomOf } from './tile-pyramid.ts';
import { type LyingScan, setUpright } from './turned-scan.ts';

/** A scan with fewer pixels is cut into tiles before anybody misses it: an A1 sheet at 300 dpi has 70 million. */
const LONG_SCAN_PIXELS = 80_000_000;
/** Levels of the first view above the one of a single tile: 2,049 to 4,096 pixels on the longer side. */
const LEVELS = 3;

type SheetSize = Pick<RenderedSheet, 'widthPx' | 'heightPx'>;

/** What is known of a sheet before it is drawn, and how many rows its picture is decoded from. */
export type SheetToCome = Omit<RenderedSheet, 'maxZoom' | 'tileSizePx'> & { sourceRows: number };

/** Whether somebody would wait for the tiles of a scan of this size. */
export const takesLong = ({ widthPx, heightPx }: SheetSize) => widthPx * heightPx > LONG_SCAN_PIXELS;

/** The finest level of the first view, and its size as the whole pyramid has it: each level half the next, rounded up. */
export function firstLevelOf({ widthPx, heightPx }: SheetSize): SheetSize & { zoom: number } {
  const maxZoom = maxZoomOf(widthPx, heightPx);
  const zoom = Math.min(LEVELS, maxZoom);
  const shrink = 2 ** (maxZoom - zoom);
  return { zoom, widthPx: Math.ceil(widthPx / shrink), heightPx: Math.ceil(heightPx / shrink) };
}

/** The first view of a scan that is too large to be turned in memory: made small first, then set upright. */
export async function writeTurnedFirstView(
  picture: Sharp,
  scan: LyingScan,
  sheet: SheetToCome,
  outFolder: string,
): Promise<FirstView> {
  const { widthPx, heightPx } = firstLevelOf(scan);
  const small = picture.resize({ width: widthPx, height: heightPx, fit: 'fill' });
  return writeFirstView(await setUpright(small, scan), sheet, outFolder);
}

/**
 * Makes the coarse levels of a sheet from its picture, read once at a fraction of its size, in a folder beside the
 * one that will hold the whole. @throws RenderRefusal when part of the picture is missing
 */
export async function writeFirstView(
  image: Sharp,
  { sourceRows, ...sheet }: SheetToCome,
  outFolder: string,
): Promise<FirstView> {
  const folder = `${outFolder}-first`;
  const { zoom, widthPx, heightPx } = firstLevelOf(sheet);
  const small = image.resize({ width: widthPx, height: heightPx, fit: 'fill' });
  await cutTiles(small, sheet.tileFormat, sourceRows, folder);
  const maxZoom = maxZoomOf(sheet.widthPx, sheet.heightPx);
  return { ...sheet, maxZoom, tileSizePx: TILE_SIZE_PX, folder, readyZoom: zoom };
}
