import { availableParallelism } from 'node:os';
import sharp, { type Metadata, type Sharp } from 'sharp';
import { MAX_PIXELS } from '#shared/contract/limits.ts';
import { RenderRefusal, refusals } from './refusal.ts';

// Only these may ever be decoded, whatever a file turns out to be behind its first bytes.
const LOADERS = ['Png', 'Jpeg', 'Webp', 'Tiff'].flatMap((name) => [
  `VipsForeignLoad${name}File`,
  `VipsForeignLoad${name}Buffer`,
]);

/** More threads than this need more memory and wait for the decoder anyway. */
const MOST_THREADS = 4;

/** Sets libvips up for one file after the other in a process with little memory. */
export function prepareDecoder(): void {
  sharp.cache(false);
  // By itself the package takes one thread where it finds glibc; tiles are packed while the next rows are decoded.
  sharp.concurrency(Math.min(MOST_THREADS, availableParallelism()));
  sharp.block({ operation: ['VipsForeignLoad'] });
  sharp.unblock({ operation: LOADERS });
}

/**
 * The page as sharp reads it. `failOn: 'error'`: at `warning` odd but harmless tags refuse whole sheets (a GeoTIFF's
 * text without its end mark), at `truncated` undecodable compressions come out blank and count as a success.
 */
export function openImage(file: string, pageNumber: number): Sharp {
  return sharp(file, { page: pageNumber - 1, failOn: 'error', limitInputPixels: false });
}

/** Header of a page, its size checked before anything is decoded. @throws RenderRefusal */
export async function readHeader(file: string, pageNumber: number): Promise<Metadata> {
  const header = await openImage(file, pageNumber).metadata().catch(refuseDecoding);
  if (header.width * header.height > MAX_PIXELS) {
    throw refusals.tooManyPixels(header.width, header.height, MAX_PIXELS);
  }
  return header;
}

/** Turns a decoder's complaint into a refusal; a fault of this machine stays a fault. */
export function refuseDecoding(error: unknown): never {
  if (error instanceof RenderRefusal) throw error;
  const text = error instanceof Error ? error.message : String(error);
  if (/no space left|ENOSPC|EDQUOT|unable to (create|write|open .* for writing)/i.test(text)) throw error;
  if (/out of memory|unable to (m?alloc|allocate)/i.test(text)) throw refusals.outOfMemory();
  throw refusals.damagedImage(error);
}

/** Libvips' 72 stands for "not stated", and no drawing was ever scanned at that. */
const NOT_STATED = 73;

/** Stated resolution across, in dots per inch, when it can be true of a drawing. */
export function statedDpi(header: Metadata): number | null {
  const { density } = header;
  return density !== undefined && density > NOT_STATED && density <= 4800 ? density : null;
}
