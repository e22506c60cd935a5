import { describe, expect, it } from 'vitest';
import { byteText, drawingName } from '#client/text/drawings.ts';

describe('the name of a drawing', () => {
  it.each([
    [{ number: 'HF-114', revision: 'C', fileName: 'a.tif' }, 'HF-114 rev C'],
    [{ number: 'HF-120', revision: '', fileName: 'b.jpg' }, 'HF-120'],
    [{ number: '', revision: 'C', fileName: 'scan 3.tif' }, 'scan 3.tif'],
  ])('%j is %j', (drawing, name) => {
    expect(drawingName(drawing)).toBe(name);
  });
});

describe('the size of a file', () => {
  it.each([
    [0, '0 bytes'],
    [1023, '1023 bytes'],
    [1025, '2 kB'],
    [262_144_000, '250.0 MB'],
  ])('%d bytes are %j', (bytes, words) => {
    expect(byteText(bytes)).toBe(words);
  });
});
