import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument, SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { centredPileNet } from '#tests/support/exact-nets/centred-pile-net.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const [parabola, apron] = EXACT_NETS as [(typeof EXACT_NETS)[number], (typeof EXACT_NETS)[number]];
const parabolaNet = () => exactNetDocument(parabola.net, { pxPerUnit: parabola.pxPerUnit, jitterPx: 1.5 });
const apronNet = () => exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });

const gapsIn = (document: FlowNetDocument) =>
  readNet(document).findings.filter((found) => found.code === 'gapAtBoundary');

/** The line without its last points, down to a part of them. */
function shortened(line: TracedLine, part: number): TracedLine {
  return { ...line, points: line.points.slice(0, Math.ceil(part * line.points.length)) };
}

/** The line carried straight on past its last point, by a distance in pixels. */
function carriedOn(line: TracedLine, distance: number): TracedLine {
  const end = line.points.at(-1)!;
  const before = line.points.at(-2)!;
  const length = Math.hypot(end[0] - before[0], end[1] - before[1]);
  const on = (k: 0 | 1) => end[k] + ((end[k] - before[k]) * distance) / length;
  const tip: SheetPoint = [on(0), on(1)];
  return { ...line, points: [...line.points, tip] };
}

const fifth = (change: (line: TracedLine) => TracedLine) => (line: TracedLine, i: number) =>
  i === 4 ? change(line) : line;

describe('a line whose end reaches no boundary', () => {
  it.each([...EXACT_NETS])('is not found in a net that is drawn to its boundaries: $name', (entry) => {
    for (const seed of [1, 2, 3]) {
      const tracing = { pxPerUnit: entry.pxPerUnit, jitterPx: 1.5, seed };
      expect(gapsIn(exactNetDocument(entry.net, tracing))).toEqual([]);
    }
  });

  it('is not found in a net about a floor with a pile either', () => {
    const net = centredPileNet({
      width: 20,
      depth: 5,
      headwater: 106,
      tailwater: 100,
      drops: 10,
      channels: 5,
      middle: [0, 98],
    });
    expect(gapsIn(exactNetDocument(net, { pxPerUnit: 60, jitterPx: 1.5 }))).toEqual([]);
  });

  it('is questioned with its place and the line, and the figures stay', () => {
    const document = withLines(
      parabolaNet(),
      'equipotential',
      fifth((line) => shortened(line, 0.8)),
    );
    const line = Object.values(document.entities).filter(
      ({ value }) => value.kind === 'line' && value.line === 'equipotential',
    )[4]!;
    const tip = line.value.kind === 'line' ? line.value.points.at(-1) : null;
    const gaps = gapsIn(document);
    expect(gaps).toMatchObject([{ weight: 'question', cell: 'netCheck', entityIds: [line.id] }]);
    // The trace is read without its tremor, by which the tip may move.
    const [x, y] = gaps[0]!.at!;
    expect(Math.hypot(x - tip![0], y - tip![1])).toBeLessThan(3);
    expect(gaps[0]?.text).toMatch(/at one end\. Extend it to the boundary, or trace the boundary/);
    expect(readNet(document).state).toBe('read');
  });

  it('is questioned at a phreatic line that stops short of the face or of the drain', () => {
    const gaps = gapsIn(withLines(parabolaNet(), 'phreaticLine', (line) => shortened(line, 0.7)));
    expect(gaps.map((found) => found.text)).toEqual([
      'The phreatic line reaches no boundary at one end. Extend it to the face or the drain at which it ends, or trace that boundary.',
    ]);
  });

  it('is questioned at every line of a net whose base is not traced', () => {
    // The ninth and last one ends at the edge of the drain, within reach of it.
    const bare = withLines(parabolaNet(), 'impervious', () => null);
    expect(gapsIn(withLines(bare, 'flowLine', () => null))).toHaveLength(8);
  });
});

describe('a line that ends where it should', () => {
  it('may stop short by what the tracing bridges', () => {
    expect(gapsIn(withLines(apronNet(), 'equipotential', (line) => shortened(line, 0.99)))).toEqual([]);
  });

  it('may run on past the outermost flow line, where there is no base', () => {
    expect(gapsIn(withLines(apronNet(), 'equipotential', (line) => carriedOn(line, 300)))).toEqual([]);
  });

  it('may not stop between two flow lines', () => {
    const gaps = gapsIn(
      withLines(
        apronNet(),
        'equipotential',
        fifth((line) => shortened(line, 0.93)),
      ),
    );
    expect(gaps).toHaveLength(1);
  });

  it('is not asked about while a boundary is still to be marked', () => {
    const early = withLines(parabolaNet(), 'submergedFace', () => null);
    expect(gapsIn(withLines(early, 'impervious', () => null))).toEqual([]);
  });
});
