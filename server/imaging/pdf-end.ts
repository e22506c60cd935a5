import { createReadStream } from 'node:fs';

const MARK = Buffer.from('startxref');

/**
 * Whether a PDF has the mark that ends it (ISO 32000-1, 7.5.5: `startxref` before `%%EOF`). A file that was cut off
 * while it was copied has none; it could be repaired into something that shows less than was drawn.
 */
export async function hasPdfEnd(file: string): Promise<boolean> {
  // The mark may lie across two chunks.
  let carried = Buffer.alloc(0);
  for await (const chunk of createReadStream(file) as AsyncIterable<Buffer>) {
    const seen = Buffer.concat([carried, chunk]);
    if (seen.includes(MARK)) return true;
    carried = seen.subarray(Math.max(0, seen.length - MARK.length));
  }
  return false;
}
