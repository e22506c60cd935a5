import path from 'node:path';
import sharp from 'sharp';
import { type PaperTone, paperToneOf, whitenPaper } from '#shared/compute/renditions/paper-tone.ts';
import { makeGrey, type PixelRows } from '#shared/compute/renditions/tones.ts';

/** The finished tiles of a sheet's base raster in a local folder. */
export interface BaseTiles {
  folder: string;
  widthPx: number;
  heightPx: number;
  tileSizePx: number;
  maxZoom: number;
  format: 'png' | 'jpeg' | 'webp';
}

/** Decoded tiles that are kept: two rows of tiles of an E-size sheet. */
const KEPT_BYTES = 160 * 1024 * 1024;
/** Pixels along the longer side of the picture from which the paper's tone is read. */
const PAPER_PX = 768;

/** Windows cut out of a base raster, of which only the tiles in use are in memory. */
export class BaseRaster {
  readonly #tiles: BaseTiles;
  readonly channels: 1 | 3;
  readonly #grey: boolean;
  readonly #paper: PaperTone | null;
  readonly #kept = new Map<string, Promise<PixelRows>>();
  readonly #keptTiles: number;

  private constructor(tiles: BaseTiles, channels: 1 | 3, grey: boolean, paper: PaperTone | null) {
    this.#tiles = tiles;
    this.channels = channels;
    this.#grey = grey;
    this.#paper = paper;
    this.#keptTiles = Math.max(4, Math.floor(KEPT_BYTES / (tiles.tileSizePx ** 2 * channels)));
  }

  /** `grey`: colours are made grey. `whiten`: the paper's tone is taken off, which is read from a reduced level first. */
  static async open(tiles: BaseTiles, grey: boolean, whiten: boolean): Promise<BaseRaster> {
    const first = await sharp(tileFile(tiles, tiles.maxZoom, 0, 0)).metadata();
    const channels = first.channels <= 2 ? 1 : 3;
    const paper = whiten ? await readPaper(tiles, channels) : null;
    return new BaseRaster(tiles, channels, grey && channels === 3, paper);
  }

  get widthPx(): number {
    return this.#tiles.widthPx;
  }

  get heightPx(): number {
    return this.#tiles.heightPx;
  }

  /** The pixels from `left`, `top` on, all of which must lie in the raster; of one or three bytes each. */
  async window(left: number, top: number, widthPx: number, heightPx: number): Promise<PixelRows> {
    const { channels } = this;
    const data = new Uint8Array(widthPx * heightPx * channels);
    const side = this.#tiles.tileSizePx;
    const asked: Array<{ x: number; y: number; rows: Promise<PixelRows> }> = [];
    for (let y = Math.floor(top / side); y * side < top + heightPx; y += 1)
      for (let x = Math.floor(left / side); x * side < left + widthPx; x += 1)
        asked.push({ x: x * side - left, y: y * side - top, rows: this.#tile(x, y) });
    for (const { x, y, rows } of asked) paste({ data, widthPx, heightPx, channels }, await rows, x, y);
    return { data, widthPx, heightPx, channels };
  }

  /** A tile decoded, from those kept where it is one; the one unused for longest is let go. */
  #tile(x: number, y: number): Promise<PixelRows> {
    const key = `${x}_${y}`;
    const held = this.#kept.get(key);
    if (held) this.#kept.delete(key);
    const tile = held ?? this.#decode(x, y);
    this.#kept.set(key, tile);
    const oldest = this.#kept.size > this.#keptTiles ? this.#kept.keys().next().value : undefined;
    if (oldest !== undefined) this.#kept.delete(oldest);
    return tile;
  }

  async #decode(x: number, y: number): Promise<PixelRows> {
    const { tileSizePx, maxZoom, widthPx, heightPx } = this.#tiles;
    const tile = await decoded(tileFile(this.#tiles, maxZoom, x, y), this.channels);
    const place = { left: x * tileSizePx, top: y * tileSizePx, widthPx, heightPx };
    if (this.#paper) whitenPaper(tile, this.#paper, place);
    if (this.#grey) makeGrey(tile);
    return tile;
  }
}

function tileFile({ folder, format }: BaseTiles, z: number, x: number, y: number): string {
  return path.join(folder, String(z), `${x}_${y}.${format}`);
}

async function decoded(file: string, channels: 1 | 3): Promise<PixelRows> {
  const { data, info } = await sharp(file)
    .toColourspace(channels === 1 ? 'b-w' : 'srgb')
    .raw()
    .toBuffer({ resolveWithObject: true });
  return { data, widthPx: info.width, heightPx: info.height, channels };
}

/** Reads the paper's tone off the coarsest level that is fine enough, put together whole. */
async function readPaper(tiles: BaseTiles, channels: 1 | 3): Promise<PaperTone> {
  const longer = Math.max(tiles.widthPx, tiles.heightPx);
  const finer = Math.max(0, Math.floor(Math.log2(longer / PAPER_PX)));
  const z = Math.max(0, tiles.maxZoom - finer);
  const scale = 2 ** (tiles.maxZoom - z);
  const side = tiles.tileSizePx;
  const widthPx = Math.ceil(tiles.widthPx / scale);
  const heightPx = Math.ceil(tiles.heightPx / scale);
  const whole = { data: new Uint8Array(widthPx * heightPx * channels), widthPx, heightPx, channels };
  for (let y = 0; y * side < heightPx; y += 1)
    for (let x = 0; x * side < widthPx; x += 1)
      paste(whole, await decoded(tileFile(tiles, z, x, y), channels), x * side, y * side);
  return paperToneOf(whole);
}

/** Copies what of a tile lies within a window; `x`, `y`: where the tile's corner lies there. */
function paste(window: PixelRows, tile: PixelRows, x: number, y: number): void {
  const { channels } = window;
  const [from, to] = [Math.max(0, -x), Math.min(tile.widthPx, window.widthPx - x)];
  if (to <= from) return;
  for (let row = Math.max(0, -y); row < tile.heightPx && row + y < window.heightPx; row += 1) {
    const start = (row * tile.widthPx + from) * channels;
    const part = tile.data.subarray(start, start + (to - from) * channels);
    window.data.set(part, ((row + y) * window.widthPx + x + from) * channels);
  }
}
