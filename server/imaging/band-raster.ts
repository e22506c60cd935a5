import { type FileHandle, open } from 'node:fs/promises';

const ROWS_PER_STRIP = 16;
const SHORT = 3;
const LONG = 4;

/**
 * An uncompressed RGB TIFF written from top to bottom, so that a page need never lie in memory whole. libvips reads
 * it back strip by strip.
 */
export class BandRaster {
  readonly #handle: FileHandle;
  readonly #rowBytes: number;

  private constructor(handle: FileHandle, rowBytes: number) {
    this.#handle = handle;
    this.#rowBytes = rowBytes;
  }

  static async create(file: string, widthPx: number, heightPx: number): Promise<BandRaster> {
    const handle = await open(file, 'w');
    await handle.write(tiffHeader(widthPx, heightPx));
    return new BandRaster(handle, widthPx * 3);
  }

  /** Appends whole rows, 3 bytes a pixel. */
  async append(rgb: Uint8Array): Promise<void> {
    if (rgb.length % this.#rowBytes !== 0) throw new Error('a band must hold whole rows');
    await this.#handle.appendFile(rgb);
  }

  async close(): Promise<void> {
    await this.#handle.close();
  }
}

/** Header, one directory and the table of strips (TIFF 6.0, sections 2 and 3), little-endian. */
function tiffHeader(widthPx: number, heightPx: number): Buffer {
  const strips = Math.ceil(heightPx / ROWS_PER_STRIP);
  const rowBytes = widthPx * 3;
  const directoryAt = 8;
  const entryCount = 10;
  const bitsAt = directoryAt + 2 + entryCount * 12 + 4;
  const offsetsAt = bitsAt + 8;
  const countsAt = offsetsAt + strips * 4;
  const pixelsAt = countsAt + strips * 4;
  const out = Buffer.alloc(pixelsAt);
  out.write('II', 0, 'latin1');
  out.writeUInt16LE(42, 2);
  out.writeUInt32LE(directoryAt, 4);
  out.writeUInt16LE(entryCount, directoryAt);
  const stripBytes = (index: number) =>
    rowBytes * Math.min(ROWS_PER_STRIP, heightPx - index * ROWS_PER_STRIP);
  // A single strip's offset and count are stored in the entries themselves.
  const entries: Array<[number, number, number, number]> = [
    [256, LONG, 1, widthPx],
    [257, LONG, 1, heightPx],
    [258, SHORT, 3, bitsAt],
    [259, SHORT, 1, 1],
    [262, SHORT, 1, 2],
    [273, LONG, strips, strips === 1 ? pixelsAt : offsetsAt],
    [277, SHORT, 1, 3],
    [278, LONG, 1, ROWS_PER_STRIP],
    [279, LONG, strips, strips === 1 ? stripBytes(0) : countsAt],
    [284, SHORT, 1, 1],
  ];
  entries.forEach(([tag, type, count, value], index) => {
    const at = directoryAt + 2 + index * 12;
    out.writeUInt16LE(tag, at);
    out.writeUInt16LE(type, at + 2);
    out.writeUInt32LE(count, at + 4);
    out.writeUInt32LE(value, at + 8);
  });
  for (let sample = 0; sample < 3; sample++) out.writeUInt16LE(8, bitsAt + sample * 2);
  for (let index = 0; index < strips; index++) {
    out.writeUInt32LE(pixelsAt + index * ROWS_PER_STRIP * rowBytes, offsetsAt + index * 4);
    out.writeUInt32LE(stripBytes(index), countsAt + index * 4);
  }
  return out;
}
