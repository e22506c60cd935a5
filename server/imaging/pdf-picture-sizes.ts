import { createReadStream } from 'node:fs';
import { stat } from 'node:fs/promises';

const OVERLAP = 2048;
const PICTURE = /\/Subtype\s*\/Image\b/g;

let lastRead: { key: string; pixels: number } | null = null;

/**
 * Pixels of the largest picture a PDF declares, 0 when none is found. Streams and their dictionaries never lie in
 * compressed object streams (ISO 32000-1, 7.5.7), so the plain bytes can be read for them without decoding anything.
 */
export async function largestPicturePixels(file: string): Promise<number> {
  const { size, mtimeMs } = await stat(file);
  const key = `${file} ${size} ${mtimeMs}`;
  // Asked once for each page of a file.
  if (lastRead?.key !== key) lastRead = { key, pixels: await readPictureSizes(file) };
  return lastRead.pixels;
}

async function readPictureSizes(file: string): Promise<number> {
  let largest = 0;
  let carried = '';
  for await (const chunk of createReadStream(file, { highWaterMark: 2 ** 20 })) {
    const text = carried + (chunk as Buffer).toString('latin1');
    for (const match of text.matchAll(PICTURE)) largest = Math.max(largest, pixelsAround(text, match.index));
    carried = text.slice(-OVERLAP);
  }
  return largest;
}

function pixelsAround(text: string, at: number): number {
  const start = Math.max(0, text.lastIndexOf(' obj', at), at - OVERLAP);
  const end = text.indexOf('stream', at);
  const dictionary = text.slice(start, end < 0 ? at + OVERLAP : end);
  const width = Number(/\/Width\s+(\d+)/.exec(dictionary)?.[1] ?? 0);
  const height = Number(/\/Height\s+(\d+)/.exec(dictionary)?.[1] ?? 0);
  return width * height;
}
