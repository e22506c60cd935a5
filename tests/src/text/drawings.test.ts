import { describe, expect, it } from 'vitest';
import { byteText, drawingName, netStateText } from '#client/text/drawings.ts';
import type { NetSummary } from '#shared/contract/drawings.ts';

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

describe('where a net stands', () => {
  const net: NetSummary = {
    id: '01930000-0000-7000-8000-000000000001',
    name: 'Full supply',
    drops: 10,
    openNotes: 0,
    state: 'draft',
    revisionLabel: null,
    reviewer: null,
    archivedAt: null,
  };

  it.each<[Partial<NetSummary>, string]>([
    [{ drops: null }, 'not finished'],
    [{}, 'traced'],
    [{ state: 'sent', revisionLabel: 'A' }, 'sent for checking'],
    [{ state: 'accepted', revisionLabel: 'B' }, 'accepted B'],
    [{ state: 'accepted', revisionLabel: 'B', changedSinceRevision: true }, 'accepted B, changed since'],
    [{ state: 'returned', revisionLabel: 'A', changedSinceRevision: true }, 'returned A, changed since'],
  ])('%j is %j', (change, words) => {
    expect(netStateText({ ...net, ...change })).toBe(words);
  });
});
