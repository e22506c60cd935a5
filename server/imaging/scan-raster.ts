import { open, writeFile } from 'node:fs/promises';
import { createInflate, type Inflate } from 'node:zlib';
import { BandRaster, rowBytesOf, tiffHeader } from './band-raster.ts';
import type { PageScan } from './pdf-scan.ts';
import { refusals } from './refusal.ts';

const G3 = 3;
const G4 = 4;
const BATCH_BYTES = 2 ** 20;

/** Writes a page's scan as a file that libvips reads from top to bottom. @throws Error when it is not what it says, RenderRefusal when it is cut short */
export async function writeScan(scan: PageScan, file: string): Promise<void> {
  if (scan.coding === 'jpeg') await writeFile(file, scan.data);
  else if (scan.coding === 'fax') await writeFax(scan, file);
  else await writeInflated(scan, file);
}

/** A picture coded as fax machines do. */
export type FaxPicture = Pick<PageScan, 'data' | 'widthPx' | 'heightPx' | 'inverted' | 'parameter'>;

/**
 * Fax data put into a TIFF as they are. A PDF turns black runs into 0 unless `BlackIs1`, and shows 0 as black unless
 * `Decode` inverts; a TIFF with white as 0 shows black runs black.
 */
export async function writeFax(scan: FaxPicture, file: string): Promise<void> {
  const isShownInverted = (scan.parameter('BlackIs1', 0) === 1) !== scan.inverted;
  const k = scan.parameter('K', 0);
  if (scan.parameter('Columns', 1728) !== scan.widthPx) throw new Error('the rows have another length');
  if (scan.parameter('EncodedByteAlign', 0) === 1) throw new Error('byte-aligned rows are not taken');
  const zeroIs = isShownInverted ? 'black' : 'white';
  const header = tiffHeader(
    scan.widthPx,
    scan.heightPx,
    { samples: 1, bits: 1, zeroIs },
    {
      compression: k < 0 ? G4 : G3,
      rowsPerStrip: scan.heightPx,
      strips: [scan.data.length],
      ...(k < 0 ? {} : { t4Options: k > 0 ? 1 : 0 }),
    },
  );
  const handle = await open(file, 'w');
  try {
    await handle.write(header);
    await handle.appendFile(scan.data);
  } finally {
    await handle.close();
  }
}

/** Inflates row by row, undoing PNG's filters (ISO/IEC 15948, 9) where the scan was written with them. */
async function writeInflated(scan: PageScan, file: string): Promise<void> {
  const kind = { samples: scan.samples, bits: scan.bits, zeroIs: scan.inverted ? 'white' : 'black' } as const;
  if (scan.inverted && scan.samples === 3) throw new Error('inverted colours are not taken');
  const predictor = scan.parameter('Predictor', 1);
  if (predictor !== 1 && predictor < 10) throw new Error('TIFF prediction is not taken');
  const rowBytes = rowBytesOf(scan.widthPx, kind);
  const filterBytes = predictor === 1 ? 0 : 1;
  const pixelBytes = Math.max(1, (scan.samples * scan.bits) >> 3);
  const raster = await BandRaster.create(file, scan.widthPx, scan.heightPx, kind);
  try {
    let rows = 0;
    let previous = new Uint8Array(rowBytes);
    let batch: Uint8Array[] = [];
    const write = async () => {
      await raster.append(Buffer.concat(batch));
      batch = [];
    };
    for await (const row of rowsOf(scan.data, rowBytes + filterBytes)) {
      if (rows === scan.heightPx) break;
      const plain = filterBytes ? unfiltered(row, previous, pixelBytes) : row;
      batch.push(plain);
      previous = plain;
      rows++;
      if (batch.length * rowBytes > BATCH_BYTES) await write();
    }
    await write();
    if (rows < scan.heightPx) throw refusals.damagedPage('the scan is cut short');
  } finally {
    await raster.close();
  }
}

async function* rowsOf(data: Uint8Array, rowBytes: number): AsyncGenerator<Uint8Array<ArrayBuffer>> {
  const inflate = createInflate({ chunkSize: 2 ** 18 });
  inflate.end(data);
  let carried = Buffer.alloc(0);
  for await (const chunk of readable(inflate)) {
    const bytes = carried.length > 0 ? Buffer.concat([carried, chunk]) : chunk;
    let at = 0;
    for (; at + rowBytes <= bytes.length; at += rowBytes)
      yield Uint8Array.prototype.slice.call(bytes, at, at + rowBytes);
    carried = Buffer.from(bytes.subarray(at));
  }
}

/** What can be inflated; how much is missing shows in the number of rows. */
async function* readable(inflate: Inflate): AsyncGenerator<Buffer> {
  try {
    for await (const chunk of inflate) yield chunk as Buffer;
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && String(error.code).startsWith('Z_'))) throw error;
  }
}

function unfiltered(row: Uint8Array, above: Uint8Array, pixelBytes: number): Uint8Array<ArrayBuffer> {
  const filter = row[0];
  const out = row.slice(1);
  for (let i = 0; i < out.length; i++) {
    const left = i >= pixelBytes ? out[i - pixelBytes]! : 0;
    const up = above[i]!;
    if (filter === 1) out[i]! += left;
    else if (filter === 2) out[i]! += up;
    else if (filter === 3) out[i]! += (left + up) >> 1;
    else if (filter === 4) out[i]! += paeth(left, up, i >= pixelBytes ? above[i - pixelBytes]! : 0);
    else if (filter !== 0) throw new Error('unknown PNG filter');
  }
  return out;
}

function paeth(left: number, up: number, upLeft: number): number {
  const estimate = left + up - upLeft;
  const [a, b, c] = [Math.abs(estimate - left), Math.abs(estimate - up), Math.abs(estimate - upLeft)];
  if (a <= b && a <= c) return left;
  return b <= c ? up : upLeft;
}
