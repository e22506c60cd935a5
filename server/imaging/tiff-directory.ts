import { type FileHandle, open } from 'node:fs/promises';
import { MAX_PAGES } from '#shared/contract/limits.ts';
import { refusals } from './refusal.ts';

/** What one TIFF directory (one page) says about itself, before any pixel is decoded. */
export interface TiffPage {
  widthPx: number;
  heightPx: number;
  bitsPerSample: number;
  samplesPerPixel: number;
  compression: number;
  photometric: number;
  /** Pixels along a unit of length, across and down, in whatever unit; 0 when not stated. */
  resolution: [number, number];
  /** File offset of the value of the photometric tag. */
  photometricAt: number | null;
}

interface Layout {
  bigEndian: boolean;
  big: boolean;
  firstDirectory: number;
}

const TAG = {
  width: 256,
  height: 257,
  bits: 258,
  compression: 259,
  photometric: 262,
  samples: 277,
  acrossRes: 282,
  downRes: 283,
};
const MAX_ENTRIES = 4096;
const RATIONAL = 5;

/**
 * The pages of a TIFF in file order. A chain of directories that runs back into itself ends where it does so.
 * @throws RenderRefusal when the chain cannot be followed or is longer than a file may be.
 */
export async function readTiffPages(file: string): Promise<TiffPage[]> {
  const handle = await open(file, 'r');
  try {
    const layout = await readLayout(handle);
    const pages: TiffPage[] = [];
    const seen = new Set<number>();
    let offset = layout.firstDirectory;
    while (offset !== 0 && !seen.has(offset)) {
      seen.add(offset);
      if (seen.size > MAX_PAGES) throw refusals.tooManyPages(seen.size, MAX_PAGES);
      const { page, next } = await readDirectory(handle, layout, offset);
      pages.push(page);
      offset = next;
    }
    return pages;
  } finally {
    await handle.close();
  }
}

async function readLayout(handle: FileHandle): Promise<Layout> {
  const head = await readAt(handle, 0, 8);
  const bigEndian = head.toString('latin1', 0, 2) === 'MM';
  const big = uint(head, 2, 2, bigEndian) === 43;
  const rest = big ? await readAt(handle, 8, 8) : head.subarray(4, 8);
  return { bigEndian, big, firstDirectory: uint(rest, 0, big ? 8 : 4, bigEndian) };
}

async function readDirectory(handle: FileHandle, layout: Layout, offset: number) {
  const [countBytes, entryBytes, pointerBytes] = layout.big ? [8, 20, 8] : [2, 12, 4];
  const count = uint(await readAt(handle, offset, countBytes), 0, countBytes, layout.bigEndian);
  if (count === 0 || count > MAX_ENTRIES) throw refusals.damagedImage();
  const table = await readAt(handle, offset + countBytes, count * entryBytes + pointerBytes);
  const values = new Map<number, number>();
  let photometricAt: number | null = null;
  for (let i = 0; i < count; i++) {
    const at = i * entryBytes;
    const tag = uint(table, at, 2, layout.bigEndian);
    values.set(tag, firstValue(table, at, layout));
    if (tag === TAG.photometric) photometricAt = offset + countBytes + at + (layout.big ? 12 : 8);
  }
  const next = uint(table, count * entryBytes, pointerBytes, layout.bigEndian);
  const resolution: [number, number] = [
    await rationalAt(handle, layout, values.get(TAG.acrossRes)),
    await rationalAt(handle, layout, values.get(TAG.downRes)),
  ];
  return { page: { ...toPage(values), resolution, photometricAt }, next };
}

/**
 * First value of an entry where it is stored in the entry itself, or where a classic TIFF's rational lies; 0 for what
 * lies elsewhere, such as several bits-per-sample.
 */
function firstValue(table: Buffer, at: number, { bigEndian, big }: Layout): number {
  const type = uint(table, at + 2, 2, bigEndian);
  const valueAt = at + (big ? 12 : 8);
  const count = uint(table, at + 4, big ? 8 : 4, bigEndian);
  const size = type === 3 ? 2 : type === 4 ? 4 : type === 1 ? 1 : 0;
  if (type === RATIONAL && !big) return uint(table, valueAt, 4, bigEndian);
  if (size === 0 || count * size > (big ? 8 : 4)) return 0;
  return uint(table, valueAt, size, bigEndian);
}

/** A rational (numerator, denominator), which a classic TIFF keeps elsewhere and a BigTIFF in the entry: then 0. */
async function rationalAt(
  handle: FileHandle,
  { bigEndian }: Layout,
  offset: number | undefined,
): Promise<number> {
  if (!offset) return 0;
  const bytes = await readAt(handle, offset, 8).catch(() => Buffer.alloc(8));
  const denominator = uint(bytes, 4, 4, bigEndian);
  return denominator === 0 ? 0 : uint(bytes, 0, 4, bigEndian) / denominator;
}

function toPage(values: Map<number, number>): Omit<TiffPage, 'resolution' | 'photometricAt'> {
  return {
    widthPx: values.get(TAG.width) ?? 0,
    heightPx: values.get(TAG.height) ?? 0,
    // Absent means 1 (TIFF 6.0, section 8); stored elsewhere means several samples, 8 bits or more each.
    bitsPerSample: values.get(TAG.bits) ?? 1,
    samplesPerPixel: values.get(TAG.samples) ?? 1,
    compression: values.get(TAG.compression) ?? 1,
    photometric: values.get(TAG.photometric) ?? -1,
  };
}

async function readAt(handle: FileHandle, position: number, length: number): Promise<Buffer> {
  if (!Number.isSafeInteger(position + length)) throw refusals.damagedImage();
  const { buffer, bytesRead } = await handle.read(Buffer.alloc(length), 0, length, position);
  if (bytesRead < length) throw refusals.damagedImage();
  return buffer;
}

function uint(bytes: Buffer, at: number, size: number, bigEndian: boolean): number {
  if (size === 8) return Number(bigEndian ? bytes.readBigUInt64BE(at) : bytes.readBigUInt64LE(at));
  return bigEndian ? bytes.readUIntBE(at, size) : bytes.readUIntLE(at, size);
}
