import { promisify } from 'node:util';
import { crc32, deflate } from 'node:zlib';

const SIGNATURE = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);
const deflated = promisify(deflate);

/**
 * A white sheet of this size as PNG (ISO/IEC 15948), one bit a pixel: each row is a filter byte of 0 and then ones.
 * A sheet of 100 million pixels takes some 12 kB.
 */
export async function blankPng(widthPx: number, heightPx: number): Promise<Buffer> {
  const row = Buffer.alloc(1 + Math.ceil(widthPx / 8), 0xff);
  row[0] = 0;
  const header = Buffer.alloc(13);
  header.writeUInt32BE(widthPx, 0);
  header.writeUInt32BE(heightPx, 4);
  header[8] = 1;
  const rows = await deflated(Buffer.alloc(row.length * heightPx, row));
  return Buffer.concat([
    SIGNATURE,
    chunk('IHDR', header),
    chunk('IDAT', rows),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

function chunk(type: string, data: Buffer): Buffer {
  const content = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const length = Buffer.alloc(4);
  length.writeUInt32BE(data.length);
  const check = Buffer.alloc(4);
  check.writeUInt32BE(crc32(content));
  return Buffer.concat([length, content, check]);
}
