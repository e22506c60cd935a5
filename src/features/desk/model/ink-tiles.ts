import type { InkSheet, LevelFrame } from '#shared/compute/ink/follow-over-sheet.ts';
import type { InkWindow } from '#shared/compute/ink/ink-window.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { type TilePlace, tileAddress } from './tile-address.ts';

export type InkTiles = Pick<SheetDto, 'id' | 'widthPx' | 'heightPx' | 'tiles'>;

/** Grey tiles kept, bytes: some three hundred of 512 px. */
const KEPT_BYTES = 80_000_000;
/** Weights of red, green and blue in a grey, in 256ths (ITU-R BT.601). */
const [RED, GREEN, BLUE] = [77, 150, 29];

/** A sheet's pixels as grey windows put together of its tiles. `load` fetches one tile as grey values. */
export function inkSheetOf(
  { widthPx, heightPx, tiles }: InkTiles,
  load: (tile: TilePlace) => Promise<InkWindow>,
): InkSheet {
  const kept = new Map<string, Promise<InkWindow>>();
  const most = Math.max(8, Math.floor(KEPT_BYTES / tiles.tileSizePx ** 2));

  function tileAt(tile: TilePlace): Promise<InkWindow> {
    const key = `${tile.z}/${tile.x}_${tile.y}`;
    const loaded = kept.get(key) ?? load(tile);
    kept.delete(key);
    kept.set(key, loaded);
    loaded.catch(() => kept.delete(key));
    const oldest = kept.keys().next().value;
    if (kept.size > most && oldest !== undefined) kept.delete(oldest);
    return loaded;
  }

  return {
    widthPx,
    heightPx,
    halvings: tiles.maxZoom,
    async window(level, frame) {
      const places = tilesOver(frame, tiles.tileSizePx, tiles.maxZoom - level);
      const loaded = await Promise.all(places.map(tileAt));
      const [, , width, height] = frame;
      const window = { width, height, grey: new Uint8Array(width * height).fill(255) };
      for (const [i, tile] of loaded.entries()) paste(window, frame, tile, places[i]!, tiles.tileSizePx);
      return window;
    },
  };
}

function tilesOver([left, top, width, height]: LevelFrame, side: number, z: number): TilePlace[] {
  const places: TilePlace[] = [];
  for (let y = Math.floor(top / side); y * side < top + height; y += 1) {
    for (let x = Math.floor(left / side); x * side < left + width; x += 1) places.push({ z, x, y });
  }
  return places;
}

/** Lays a tile into the window at its place. */
function paste(
  window: InkWindow,
  [left, top]: LevelFrame,
  tile: InkWindow,
  place: TilePlace,
  side: number,
): void {
  const [x, y] = [place.x * side - left, place.y * side - top];
  const from = Math.max(0, -x);
  const to = Math.min(tile.width, window.width - x);
  if (to <= from) return;
  for (let row = Math.max(0, -y); row < Math.min(tile.height, window.height - y); row += 1) {
    const values = tile.grey.subarray(row * tile.width + from, row * tile.width + to);
    window.grey.set(values, (y + row) * window.width + x + from);
  }
}

/** Fetches tiles and decodes them to grey, in a worker: it needs no page. */
export function greyTileLoader(sheet: InkTiles): (tile: TilePlace) => Promise<InkWindow> {
  return async (tile) => {
    const response = await fetch(tileAddress(sheet, tile), { credentials: 'same-origin' });
    if (!response.ok) throw new Error(`The tile answered ${response.status}.`);
    const picture = await createImageBitmap(await response.blob());
    const { width, height } = picture;
    const context = new OffscreenCanvas(width, height).getContext('2d', { willReadFrequently: true });
    if (context === null) throw new Error('The browser gives no canvas in a worker.');
    // What is transparent is paper.
    context.fillStyle = '#fff';
    context.fillRect(0, 0, width, height);
    context.drawImage(picture, 0, 0);
    picture.close();
    return { width, height, grey: greyOf(context.getImageData(0, 0, width, height).data) };
  };
}

export function greyOf(rgba: Uint8ClampedArray): Uint8Array {
  const grey = new Uint8Array(rgba.length / 4);
  for (let i = 0; i < grey.length; i += 1) {
    const at = 4 * i;
    grey[i] = (RED * rgba[at]! + GREEN * rgba[at + 1]! + BLUE * rgba[at + 2]!) >> 8;
  }
  return grey;
}
