import { describe, expect, it } from 'vitest';
import { RenderRefusal } from '#server/imaging/refusal.ts';
import { sniffHead } from '#server/imaging/sniff.ts';

const bytes = (...parts: Array<string | number[]>) =>
  Buffer.concat(
    parts.map((part) => (typeof part === 'string' ? Buffer.from(part, 'latin1') : Buffer.from(part))),
  );

const refusalOf = (head: Buffer): string => {
  try {
    return `taken as ${sniffHead(head)}`;
  } catch (error) {
    return error instanceof RenderRefusal ? error.message : String(error);
  }
};

describe('the kind of a file', () => {
  it.each([
    ['png', bytes([0x89], 'PNG\r\n', [0x1a], '\n')],
    ['jpeg', bytes([0xff, 0xd8, 0xff, 0xe0])],
    ['webp', bytes('RIFF', [1, 0, 0, 0], 'WEBPVP8 ')],
    ['tiff', bytes('II', [42, 0, 8, 0, 0, 0])],
    ['tiff', bytes('MM', [0, 42, 0, 0, 0, 8])],
    ['tiff', bytes('II', [43, 0, 8, 0, 0, 0])],
    ['pdf', bytes('%PDF-1.4\n')],
  ])('is %s by its first bytes', (kind, head) => {
    expect(sniffHead(head)).toBe(kind);
  });

  it.each([
    ['nothing', Buffer.alloc(0), /is empty/],
    ['one byte', bytes('I'), /not an image or a PDF/],
    ['GIF', bytes('GIF89a'), /GIF/],
    ['BMP', bytes('BM', [0, 0, 0, 0]), /BMP/],
    ['JPEG 2000', bytes([0, 0, 0, 12], 'jP  '), /JPEG 2000/],
    ['HEIC', bytes([0, 0, 0, 24], 'ftypheic'), /most compatible/],
    ['DWG', bytes('AC1015'), /Plot it to PDF/],
    ['DXF', bytes('  0\r\nSECTION\r\n'), /Plot it to PDF/],
    ['ZIP', bytes('PK', [3, 4]), /ZIP/],
    ['PostScript', bytes('%!PS-Adobe-3.0'), /PostScript/],
    ['SVG', bytes('<?xml version="1.0"?>\n<svg onload="alert(1)">'), /SVG/],
    ['HTML', bytes('\n <!doctype HTML>'), /HTML/],
    ['a TIFF of another age', bytes('II', [44, 0, 8, 0, 0, 0]), /not an image or a PDF/],
  ])('of %s is refused by name', (_name, head, words) => {
    expect(refusalOf(head)).toMatch(words);
  });

  it('of a file that is two things is what its very first bytes say', () => {
    expect(sniffHead(bytes([0x89], 'PNG\r\n', [0x1a], '\n', '%PDF-1.4'))).toBe('png');
    expect(refusalOf(bytes('\n%PDF-1.4'))).toMatch(/not an image or a PDF/);
  });
});
