import { apiUrl } from '#client/lib/http.ts';
import type { PixelRows } from '#shared/compute/renditions/tones.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

/** Pixels along the longer side of the level that the preview is made of. */
const SMALL_PX = 1600;
type Part = {
  readonly left: number;
  readonly top: number;
  readonly widthPx: number;
  readonly heightPx: number;
};

/** The whole sheet as it was scanned, at the finest level that is small enough. */
export async function loadSmall(sheet: SheetDto, signal: AbortSignal): Promise<PixelRows> {
  const longer = Math.max(sheet.widthPx, sheet.heightPx);
  const coarser = Math.max(0, Math.ceil(Math.log2(longer / SMALL_PX)));
  const level = Math.max(0, sheet.tiles.maxZoom - coarser);
  const scale = 2 ** (sheet.tiles.maxZoom - level);
  const size = { widthPx: Math.ceil(sheet.widthPx / scale), heightPx: Math.ceil(sheet.heightPx / scale) };
  return loadPart(sheet, level, { left: 0, top: 0, ...size }, signal);
}

/** A part of the sheet as it was scanned at full size, in its pixels; white beside the sheet. */
export function loadFull(sheet: SheetDto, part: Part, signal: AbortSignal): Promise<PixelRows> {
  return loadPart(sheet, sheet.tiles.maxZoom, part, signal);
}

async function loadPart(
  sheet: SheetDto,
  level: number,
  { left, top, widthPx, heightPx }: Part,
  signal: AbortSignal,
): Promise<PixelRows> {
  const canvas = new OffscreenCanvas(widthPx, heightPx);
  const context = canvas.getContext('2d', { willReadFrequently: true });
  if (context === null) throw new Error('The browser gives no canvas.');
  context.fillStyle = '#ffffff';
  context.fillRect(0, 0, widthPx, heightPx);
  const side = sheet.tiles.tileSizePx;
  const scale = 2 ** (sheet.tiles.maxZoom - level);
  const [lastX, lastY] = [sheet.widthPx, sheet.heightPx].map((px) => Math.ceil(px / scale / side) - 1);
  const tiles: Promise<void>[] = [];
  for (let y = Math.max(0, Math.floor(top / side)); y * side < top + heightPx && y <= lastY!; y += 1)
    for (let x = Math.max(0, Math.floor(left / side)); x * side < left + widthPx && x <= lastX!; x += 1)
      tiles.push(
        loadTile(sheet, `${level}/${x}_${y}`, signal).then((tile) => {
          context.drawImage(tile, x * side - left, y * side - top);
          tile.close();
        }),
      );
  await Promise.all(tiles);
  const { data } = context.getImageData(0, 0, widthPx, heightPx);
  return { data, widthPx, heightPx, channels: 4 };
}

async function loadTile({ id, tiles }: SheetDto, tile: string, signal: AbortSignal): Promise<ImageBitmap> {
  const response = await fetch(apiUrl(`/sheets/${id}/tiles/${tiles.rendition}/${tile}`), { signal });
  if (!response.ok) throw new Error(`The tile answered ${response.status}.`);
  return createImageBitmap(await response.blob());
}
