import { open } from 'node:fs/promises';
import { refusals } from './refusal.ts';

export type FileKind = 'png' | 'jpeg' | 'webp' | 'tiff' | 'pdf';

export const mediaTypes: Record<FileKind, string> = {
  png: 'image/png',
  jpeg: 'image/jpeg',
  webp: 'image/webp',
  tiff: 'image/tiff',
  pdf: 'application/pdf',
};

const HEAD_BYTES = 4096;

/** The kind of a file, told from its first bytes and never from its name. @throws RenderRefusal */
export async function sniffFile(file: string): Promise<FileKind> {
  const handle = await open(file, 'r');
  try {
    const { buffer, bytesRead } = await handle.read(Buffer.alloc(HEAD_BYTES), 0, HEAD_BYTES, 0);
    return sniffHead(buffer.subarray(0, bytesRead));
  } finally {
    await handle.close();
  }
}

/**
 * A file that could be read in two ways (a PNG with a PDF behind it) is what its very first bytes say: PDF readers
 * look for `%PDF` anywhere in the first kilobyte, which is how one file becomes two.
 */
export function sniffHead(head: Buffer): FileKind {
  if (head.length === 0) throw refusals.empty();
  if (starts(head, [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a])) return 'png';
  if (starts(head, [0xff, 0xd8, 0xff])) return 'jpeg';
  if (ascii(head, 0, 4) === 'RIFF' && ascii(head, 8, 4) === 'WEBP') return 'webp';
  if (isTiff(head)) return 'tiff';
  if (ascii(head, 0, 5) === '%PDF-') return 'pdf';
  throw describeOther(head);
}

function isTiff(head: Buffer): boolean {
  const order = ascii(head, 0, 2);
  if (head.length < 8 || (order !== 'II' && order !== 'MM')) return false;
  const version = order === 'II' ? head.readUInt16LE(2) : head.readUInt16BE(2);
  return version === 42 || version === 43;
}

function describeOther(head: Buffer) {
  const name = binaryKind(head) ?? textKind(head);
  if (name === 'HEIC photograph') {
    return refusals.unsupported(
      'The file is a HEIC photograph, which is not taken.',
      'Set the camera to "most compatible" (JPEG), or save the picture as JPEG and upload that.',
    );
  }
  if (name === 'CAD drawing') {
    return refusals.unsupported(
      'The file is a CAD drawing, which is not taken.',
      'Plot it to PDF at full size and upload that.',
    );
  }
  if (name) return refusals.unsupported(`The content is ${name}, which is not taken.`);
  return refusals.unsupported('The file is not an image or a PDF, whatever its name says.');
}

function binaryKind(head: Buffer): string | null {
  if (ascii(head, 0, 4) === 'GIF8') return 'a GIF picture';
  if (ascii(head, 0, 2) === 'BM') return 'a BMP picture';
  if (ascii(head, 4, 4) === 'jP  ' || starts(head, [0xff, 0x4f, 0xff, 0x51])) return 'a JPEG 2000 picture';
  if (ascii(head, 4, 4) === 'ftyp')
    return /^(hei|hev|mif1)/.test(ascii(head, 8, 4)) ? 'HEIC photograph' : 'a film';
  if (/^AC10\d\d/.test(ascii(head, 0, 6))) return 'CAD drawing';
  if (ascii(head, 0, 8) === 'AT&TFORM') return 'a DjVu document';
  if (ascii(head, 0, 4) === '8BPS') return 'a layered picture (PSD)';
  if (starts(head, [0x50, 0x4b, 0x03, 0x04])) return 'a ZIP archive or an office document';
  if (starts(head, [0xd0, 0xcf, 0x11, 0xe0])) return 'an office document';
  return null;
}

function textKind(head: Buffer): string | null {
  const text = head
    .toString('latin1')
    .replace(/^\u00ef\u00bb\u00bf/, '')
    .trimStart();
  if (/^%!PS/.test(text)) return 'a PostScript file';
  if (/<svg[\s>]/i.test(text)) return 'an SVG picture';
  if (/^<(!doctype html|html|head|body)/i.test(text)) return 'a web page (HTML)';
  if (/^\s*0\s*\r?\n\s*SECTION/.test(text)) return 'CAD drawing';
  if (/^<\?xml/.test(text)) return 'an XML file';
  return null;
}

function starts(head: Buffer, bytes: number[]): boolean {
  return head.length >= bytes.length && bytes.every((byte, index) => head[index] === byte);
}

function ascii(head: Buffer, start: number, length: number): string {
  return head.toString('latin1', start, start + length);
}
