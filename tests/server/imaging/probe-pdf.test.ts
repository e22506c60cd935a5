import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { hasPdfEnd } from '#server/imaging/pdf-end.ts';
import { probePdf } from '#server/imaging/probe-pdf.ts';
import { pdfDrawing } from '#tests/support/drawing-files.ts';

const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-probe-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const whole = pdfDrawing(Array(4).fill({ width: 612, height: 792 }));
function fileOf(name: string, bytes: Buffer): string {
  const file = path.join(folder, name);
  writeFileSync(file, bytes);
  return file;
}

describe('a PDF', () => {
  it('that was cut off while it was copied is refused, not shown with what is left of it', async () => {
    for (const share of [0.5, 0.7, 0.9]) {
      const file = fileOf('cut.pdf', whole.subarray(0, Math.floor(whole.length * share)));
      await expect(probePdf(file)).rejects.toThrow('its end is missing');
    }
  });

  it('that is whole is told page by page', async () => {
    expect(await probePdf(fileOf('whole.pdf', whole))).toHaveLength(4);
  });

  it('is known by its end also when the mark lies across two pieces of the reading, far into the file', async () => {
    // Files are read in pieces of 64 KiB: the mark begins four bytes before the end of the first.
    const filler = Buffer.alloc(65_536 - 4, 'x');
    expect(
      await hasPdfEnd(fileOf('split.pdf', Buffer.concat([filler, Buffer.from('startxref\n9\n%%EOF')]))),
    ).toBe(true);
    expect(await hasPdfEnd(fileOf('none.pdf', Buffer.concat([filler, Buffer.from('startxre\n')])))).toBe(
      false,
    );
  });
});
