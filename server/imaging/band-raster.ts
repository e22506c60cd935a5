import { type FileHandle, open } from 'node:fs/promises';

const ROWS_PER_STRIP = 16;
const SHORT = 3;
const LONG = 4;

export interface RasterKind {
  /** 1 for grey, 3 for RGB. */
  samples: 1 | 3;
  bits: 1 | 8;
  /** What a sample of 0 means in grey; RGB is never inverted. */
  zeroIs: 'black' | 'white';
}

export const RGB: RasterKind = { samples: 3, bits: 8, zeroIs: 'black' };

/** Bytes of one row, filled up to whole bytes. */
export function rowBytesOf(widthPx: number, { samples, bits }: RasterKind): number {
  return Math.ceil((widthPx * samples * bits) / 8);
}

/**
 * An uncompressed TIFF written from top to bottom, so that a page need never lie in memory whole. libvips reads it
 * back strip by strip.
 */
export class BandRaster {
  readonly #handle: FileHandle;
  readonly #rowBytes: number;

  private constructor(handle: FileHandle, rowBytes: number) {
    this.#handle = handle;
    this.#rowBytes = rowBytes;
  }

  static async create(file: string, widthPx: number, heightPx: number, kind = RGB): Promise<BandRaster> {
    const handle = await open(file, 'w');
    await handle.write(uncompressedHeader(widthPx, heightPx, kind));
    return new BandRaster(handle, rowBytesOf(widthPx, kind));
  }

  /** Appends whole rows. */
  async append(rows: Uint8Array): Promise<void> {
    if (rows.length % this.#rowBytes !== 0) throw new Error('a band must hold whole rows');
    await this.#handle.appendFile(rows);
  }

  async close(): Promise<void> {
    await this.#handle.close();
  }
}

function uncompressedHeader(widthPx: number, heightPx: number, kind: RasterKind): Buffer {
  const stripBytes = rowBytesOf(widthPx, kind) * ROWS_PER_STRIP;
  const count = Math.ceil(heightPx / ROWS_PER_STRIP);
  const lastBytes = rowBytesOf(widthPx, kind) * (heightPx - (count - 1) * ROWS_PER_STRIP);
  const strips = Array.from({ length: count }, (_, index) => (index < count - 1 ? stripBytes : lastBytes));
  return tiffHeader(widthPx, heightPx, kind, { compression: 1, rowsPerStrip: ROWS_PER_STRIP, strips });
}

export interface TiffData {
  compression: number;
  rowsPerStrip: number;
  /** Bytes of each strip, one after the other behind the header. */
  strips: number[];
  /** Options of CCITT Group 3: 1 = two-dimensional. */
  t4Options?: number;
}

/** Header, one directory and the table of strips (TIFF 6.0, sections 2, 3 and 11), little-endian. */
export function tiffHeader(widthPx: number, heightPx: number, kind: RasterKind, data: TiffData): Buffer {
  const { samples, bits, zeroIs } = kind;
  const { strips } = data;
  const entryCount = data.t4Options === undefined ? 10 : 11;
  const bitsAt = 8 + 2 + entryCount * 12 + 4;
  const offsetsAt = bitsAt + 8;
  const countsAt = offsetsAt + strips.length * 4;
  const pixelsAt = countsAt + strips.length * 4;
  const photometric = samples === 3 ? 2 : zeroIs === 'black' ? 1 : 0;
  // A single strip's offset and count, and a single sample's bits, are stored in the entries themselves.
  const entries: Array<[number, number, number, number]> = [
    [256, LONG, 1, widthPx],
    [257, LONG, 1, heightPx],
    [258, SHORT, samples, samples === 1 ? bits : bitsAt],
    [259, SHORT, 1, data.compression],
    [262, SHORT, 1, photometric],
    [273, LONG, strips.length, strips.length === 1 ? pixelsAt : offsetsAt],
    [277, SHORT, 1, samples],
    [278, LONG, 1, data.rowsPerStrip],
    [279, LONG, strips.length, strips.length === 1 ? (strips[0] ?? 0) : countsAt],
    [284, SHORT, 1, 1],
  ];
  if (data.t4Options !== undefined) entries.push([292, LONG, 1, data.t4Options]);
  const out = Buffer.alloc(pixelsAt);
  writeDirectory(out, entries);
  for (let sample = 0; sample < 3; sample++) out.writeUInt16LE(bits, bitsAt + sample * 2);
  let at = pixelsAt;
  strips.forEach((bytes, index) => {
    out.writeUInt32LE(at, offsetsAt + index * 4);
    out.writeUInt32LE(bytes, countsAt + index * 4);
    at += bytes;
  });
  return out;
}

function writeDirectory(out: Buffer, entries: Array<[number, number, number, number]>): void {
  out.write('II', 0, 'latin1');
  out.writeUInt16LE(42, 2);
  out.writeUInt32LE(8, 4);
  out.writeUInt16LE(entries.length, 8);
  entries.forEach(([tag, type, count, value], index) => {
    const at = 10 + index * 12;
    out.writeUInt16LE(tag, at);
    out.writeUInt16LE(type, at + 2);
    out.writeUInt32LE(count, at + 4);
    out.writeUInt32LE(value, at + 8);
  });
}
