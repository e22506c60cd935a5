import { describe, expect, it } from 'vitest';
import { helpWords } from '#client/features/desk/components/live-help-words.ts';
import { NO_HELP } from '#client/features/desk/model/live-help.ts';
import type { HelpShown } from '#client/features/desk/model/live-help-source.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { documentWith, LINE_A, LINE_B } from '#tests/support/desk/desk-fixture.ts';

const at = sheetPx(10, 20);
const plain: HelpShown = { at, help: NO_HELP, snap: null, head: null };
const lines = [
  { id: LINE_A, drops: 1, head: 114, source: 'counted' },
  { id: LINE_B, drops: 2, head: 112.5, source: 'counted' },
];
const read = {
  document: documentWith({}),
  reading: { lines } as unknown as NetReading,
  documentRevision: 7,
};

describe('what is told beside the pointer', () => {
  it('is nothing where nothing is known', () => {
    expect(helpWords(plain, [], read)).toEqual([]);
  });

  it('says of which net a head is, and that there is none instead of one carried on', () => {
    const between = { before: LINE_A, after: LINE_B };
    const head = { at, of: 7, head: { totalHead: 113.4, between } };
    expect(helpWords({ ...plain, head }, ['Elevation 98.0 m LD'], read)).toEqual([
      'Elevation 98.0 m LD',
      'Head 113.40 m LD',
      'between 114 and 112.5, net as read last',
    ]);
    expect(helpWords({ ...plain, head: { ...head, of: 6 } }, [], read)[1]).toContain(
      'net of before the last change',
    );
    expect(helpWords({ ...plain, head: { at, of: 7, head: null } }, [], read)).toEqual([
      'No head here by the net read last',
    ]);
  });

  it('keeps the rows of a head that is still being worked out, and never a head of another place in them', () => {
    const awaited = ['Head …', '\u00a0'];
    expect(helpWords(plain, ['Elevation 98.0 m LD'], read, awaited)).toEqual([
      'Elevation 98.0 m LD',
      ...awaited,
    ]);
    expect(helpWords({ ...plain, head: { at, of: 7, head: null } }, [], read, awaited)).toEqual([
      'No head here by the net read last',
    ]);
  });

  it('names the right angle that is wanted or the departure from it, and leaves other angles out beside it', () => {
    const meetings = [
      { kind: 'submergedFace', angleDeg: 12, wantsRight: false },
      { kind: 'flowLine', angleDeg: 84.2, wantsRight: true },
      { kind: 'impervious', angleDeg: 89.8, wantsRight: true },
    ] as const;
    const snap = 'rightAngle';
    expect(helpWords({ ...plain, snap, help: { ...NO_HELP, meetings } }, [], read)).toEqual([
      'Right angle',
      '84° at flow line, 6° off 90°',
      '90° at impervious boundary, a right angle',
    ]);
    const other = { ...NO_HELP, meetings: meetings.slice(0, 1) };
    expect(helpWords({ ...plain, help: other }, [], read)).toEqual(['12° at submerged face']);
  });

  it('gives B/L of the cells with what is wanted, by their hand where there are two', () => {
    const cells = [
      { side: 'left', ratio: 1.04 },
      { side: 'right', ratio: 0.931 },
    ] as const;
    const both = { ...NO_HELP, cells, wantedRatio: 1 };
    expect(helpWords({ ...plain, help: both }, [], read)).toEqual([
      'Cell B/L 1.04 on its left, 0.93 on its right; 1 wanted',
    ]);
    const one = { ...NO_HELP, cells: cells.slice(0, 1), wantedRatio: null };
    expect(helpWords({ ...plain, help: one }, [], read)).toEqual(['Cell B/L 1.04']);
  });
});
