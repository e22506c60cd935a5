import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { refuseUnsoundPdf } from '#server/imaging/pdf-soundness.ts';
import { probePdf } from '#server/imaging/probe-pdf.ts';
import { pdfDrawing } from '#tests/support/drawing-files.ts';

const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-sound-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const PAGES = 3;
const whole = pdfDrawing(Array(PAGES).fill({ width: 612, height: 792 })).toString('latin1');

/** Same length, so that the table of objects still points at their beginnings. */
function changed(from: string, to: string): string {
  expect(whole).toContain(from);
  const file = path.join(folder, 'changed.pdf');
  writeFileSync(file, whole.replace(from, to.padEnd(from.length)), 'latin1');
  return file;
}

/** Only its dictionary is looked at here; whether the pages can be read is the renderer's matter. */
function encrypted(dictionary: string): string {
  const file = path.join(folder, 'encrypted.pdf');
  writeFileSync(
    file,
    whole.replace('/Root', `/Encrypt << /Filter /Standard ${dictionary} >> /Root`),
    'latin1',
  );
  return file;
}

describe('a PDF', () => {
  it('whose list of pages is as long as it says is taken', async () => {
    const file = path.join(folder, 'whole.pdf');
    writeFileSync(file, whole, 'latin1');
    expect(await probePdf(file)).toHaveLength(PAGES);
  });

  it.each([
    ['more pages than it has', `/Count ${PAGES}`, '/Count 9'],
    ['fewer pages than it has', `/Count ${PAGES}`, '/Count 2'],
    ['no page', `/Count ${PAGES}`, '/Count 0'],
    ['no number of pages', `/Count ${PAGES}`, '/Kount 3'],
  ])('that states %s is refused', async (_name, from, to) => {
    await expect(probePdf(changed(from, to))).rejects.toMatchObject({ name: 'RenderRefusal' });
  });

  it('that states fewer pages than it has is told how many there are', async () => {
    await expect(probePdf(changed(`/Count ${PAGES}`, '/Count 2'))).rejects.toThrow(
      'its list of pages states 2 pages, but 3 can be found',
    );
  });

  it('whose list of pages leads back to its beginning does not hang', async () => {
    const file = changed('/Kids [3 0 R 5 0 R 7 0 R]', '/Kids [3 0 R 5 0 R 2 0 R]');
    await expect(refuseUnsoundPdf(file, PAGES)).resolves.toBeUndefined();
  });

  // ISO 32000-2:2020, Table 20 (128 bits for version 4) and Table 25 (the standard handler states bytes in CF).
  it.each([
    ['/V 4 /Length 40 /StmF /StdCF /CF << /StdCF << /CFM /V2 /Length 5 >> >>', true],
    ['/V 4 /StmF /StdCF /CF << /StdCF << /CFM /V2 /Length 6 >> >>', true],
    ['/V 4 /Length 128 /StmF /StdCF /CF << /StdCF << /CFM /AESV2 /Length 16 >> >>', false],
    ['/V 4 /StmF /StdCF /CF << /StdCF << /CFM /AESV2 /Length 16 >> >>', false],
    ['/V 4 /StmF /StdCF /CF << /StdCF << /CFM /AESV2 >> >>', false],
    ['/V 1 /Length 40', false],
    ['/V 2 /Length 64', false],
    ['/V 5 /Length 256 /StmF /StdCF /CF << /StdCF << /CFM /AESV3 /Length 32 >> >>', false],
  ])('encrypted with %s: refused %s', async (dictionary, isRefused) => {
    const checked = refuseUnsoundPdf(encrypted(dictionary), PAGES);
    if (isRefused) await expect(checked).rejects.toMatchObject({ code: 'encrypted' });
    else await expect(checked).resolves.toBeUndefined();
  });
});
