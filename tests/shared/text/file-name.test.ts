import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { cleanFileName } from '#shared/text/file-name.ts';

describe('an uploader’s file name', () => {
  it.each([
    ['', 'unnamed'],
    ['   ', 'unnamed'],
    ['..', 'unnamed'],
    ['../../etc/passwd', 'passwd'],
    ['C:\\scans\\HF-114.tif', 'HF-114.tif'],
    ['a\u0000b\nc.pdf', 'abc.pdf'],
    ['\u202egpj.exe', 'gpj.exe'],
    ['half \ud83d pair.png', 'half  pair.png'],
    ['Schnitt B–B Höhe ≈ 118 m.tif', 'Schnitt B–B Höhe ≈ 118 m.tif'],
    ['ダム断面.pdf', 'ダム断面.pdf'],
  ])('%j is kept as %j', (given, kept) => {
    expect(cleanFileName(given)).toBe(kept);
  });

  it('is cut to 200 characters and keeps its ending', () => {
    const kept = cleanFileName(`${'x'.repeat(500)}.tiff`);
    expect([...kept]).toHaveLength(200);
    expect(kept.endsWith('.tiff')).toBe(true);
    expect([...cleanFileName('𝄞'.repeat(300))]).toHaveLength(200);
  });

  it('is text that can be stored and put in a header, for every name of the shared list', () => {
    const list = path.resolve(import.meta.dirname, '../../../../shared/inputs/text/upload-names.txt');
    const names = existsSync(list)
      ? readFileSync(list, 'utf8').split('\n')
      : ['CON', 'a%00.png', '"; rm -rf'];
    for (const name of names) {
      const kept = cleanFileName(name);
      expect(kept).not.toMatch(/[\\/\p{Cc}\p{Cs}]/u);
      expect(kept.length).toBeGreaterThan(0);
      expect(cleanFileName(kept)).toBe(kept);
    }
  });
});
