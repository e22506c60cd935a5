import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { EntityOf, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { changed, withAdded, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { type SketchedLine, sketchedNet } from '#tests/support/exact-nets/sketched-net.ts';

const [parabola, apron, pile] = EXACT_NETS as [
  (typeof EXACT_NETS)[number],
  (typeof EXACT_NETS)[number],
  (typeof EXACT_NETS)[number],
];

const drawn = ({ net, pxPerUnit }: (typeof EXACT_NETS)[number], at: readonly [number, number][] = []) =>
  exactNetDocument(net, {
    pxPerUnit,
    jitterPx: 1.5,
    readings: at.map((place) => ({ at: place, clicked: true })),
  });

const finding = (document: FlowNetDocument, code: string) =>
  readNet(document).findings.find((found) => found.code === code) ?? null;

describe.each(EXACT_NETS)('a line that was not traced, the count taken from the traces: $name', (exact) => {
  const { net } = exact;
  const places = [net.placeAt(2.5, 1.5), net.placeAt(net.drops - 2.5, 1.5)].map(
    ([x, z]): [number, number] => [x, z],
  );
  const without = (k: number) =>
    changed(
      withLines(drawn(exact, places), 'equipotential', (value, i) => (i === k ? null : value)),
      'netCount',
      (value) => ({ ...value, drops: net.drops - 1 }),
    );

  it.each([0, 2, net.drops - 2])('is told by the spacing, with its place (line %i)', (k) => {
    const found = finding(without(k), 'lineMissing');
    expect(found?.weight).toBe('question');
    expect(found?.text).toContain('about 2.0 times as long');
    expect(found?.entityIds).toHaveLength(2);
    expect(found?.at).not.toBeNull();
  });

  it('marks every reading, as the whole count is wrong, and those beside it as such', () => {
    const [beside, far] = readNet(without(2)).points;
    const codes = (point: typeof beside) => point!.findings.map(({ code }) => code);
    expect(codes(beside)).toContain('lineMissingBeside');
    expect(codes(far)).toContain('lineMissingElsewhere');
    const [x, z] = places[1]!;
    const off = Math.abs(far!.totalHead! - net.headAt(x, z)) * (net.drops / (net.headwater - net.outHead));
    expect(off).toBeGreaterThan(0.1);
  });

  it('is not told of a whole net', () => {
    const codes = readNet(drawn(exact)).findings.map(({ code }) => code);
    for (const code of ['lineMissing', 'flowLineMissing', 'lastDropDiffers', 'lastChannelInPart'])
      expect(codes).not.toContain(code);
  });
});

describe('a flow line that was not traced', () => {
  it.each([apron, pile])('is told by the width of the channel: $name', (exact) => {
    const fewer = withLines(drawn(exact), 'flowLine', (value, i) => (i === 0 ? null : value));
    expect(finding(fewer, 'flowLineMissing')).toMatchObject({ weight: 'question', cell: 'channels' });
  });

  it('leaves of two channels none to be the measure, and the ratio of the cells is questioned', () => {
    const two = withLines(drawn(parabola), 'flowLine', (value, i) => (i === 0 ? null : value));
    expect(finding(two, 'cellRatioDiffers')).not.toBeNull();
    expect(finding(two, 'lastDropDiffers')).toBeNull();
  });
});

describe('a last drop in part', () => {
  it('is questioned when the count makes it a whole one', () => {
    const shorter = partNet(0.4);
    const found = finding(
      changed(shorter, 'netCount', (value) => ({ ...value, drops: 5 })),
      'lastDropDiffers',
    );
    expect(found?.text).toMatch(/1\.00 of a drop; by the shape of its squares it is 0\.4\d? ±/);
  });

  it('is proposed while no count is stated', () => {
    const found = finding(
      changed(partNet(0.4), 'netCount', (value) => ({ ...value, drops: null })),
      'lastDropInPart',
    );
    expect(found?.text).toContain('0.40');
  });

  it('is not asked about when it is stated', () => {
    expect(finding(partNet(0.4), 'lastDropDiffers')).toBeNull();
  });

  /** A strip of ground between level boundaries, cut by lines a metre apart and at the end by a part of that. */
  function partNet(part: number): FlowNetDocument {
    const end = 4 + part;
    const lines: SketchedLine[] = [
      {
        line: 'impervious',
        through: [
          [0, 0],
          [end, 0],
        ],
      },
      {
        line: 'impervious',
        through: [
          [0, 3],
          [end, 3],
        ],
      },
      {
        line: 'submergedFace',
        water: 'headwater',
        through: [
          [0, 0],
          [0, 3],
        ],
      },
      {
        line: 'submergedFace',
        water: 'tailwater',
        through: [
          [end, 0],
          [end, 3],
        ],
      },
      ...[1, 2, 3, 4].map(
        (x): SketchedLine => ({
          line: 'equipotential',
          through: [
            [x, 0],
            [x, 3],
          ],
        }),
      ),
      ...[1, 2].map(
        (z): SketchedLine => ({
          line: 'flowLine',
          through: [
            [0, z],
            [end, z],
          ],
        }),
      ),
    ];
    return sketchedNet(lines, { headwater: 20, tailwater: 10, drops: 4 + part });
  }
});

describe('an equipotential in two pieces', () => {
  const places: [number, number][] = [[...pile.net.placeAt(4.5, 2.2)], [...pile.net.placeAt(5.6, 1.1)]];
  const whole = drawn(pile, places);

  function inPieces(gapPx: number, change: Partial<EntityOf<'line'>> = {}): FlowNetDocument {
    let rest: EntityOf<'line'> | null = null;
    const first = withLines(whole, 'equipotential', (value, i) => {
      if (i !== 4) return value;
      const half = Math.floor(value.points.length / 2);
      const from = value.points.findIndex(
        (at, k) =>
          k >= half && Math.hypot(at[0] - value.points[half]![0], at[1] - value.points[half]![1]) >= gapPx,
      );
      rest = { ...value, points: [...value.points.slice(from)].reverse(), ...change };
      return { ...value, points: value.points.slice(0, half + 1) };
    });
    return withAdded(first, rest!);
  }

  it('whose ends meet is one line, and a note says so', () => {
    const document = inPieces(10);
    const reading = readNet(document);
    expect(reading.state).toBe('read');
    expect(finding(document, 'piecesJoined')).toMatchObject({
      weight: 'note',
      entityIds: [expect.any(String), expect.any(String)],
    });
    const drops = reading.lines.filter(({ source }) => source === 'counted').map((line) => line.drops);
    expect(drops.filter((count) => count === 5)).toHaveLength(2);
    readNet(whole).points.forEach((point, i) => {
      expect(Math.abs(reading.points[i]!.dropsLost! - point.dropsLost!)).toBeLessThan(0.01);
    });
  });

  it('is one line by the head typed at either piece', () => {
    const typed = inPieces(10, { head: 102 });
    expect(
      readNet(typed).lines.filter(({ source, head }) => source === 'typedHead' && head === 102),
    ).toHaveLength(2);
  });

  it('with a gap, or with two different heads, is never two drops: the figures are withheld', () => {
    const apart = inPieces(150);
    expect(finding(apart, 'lineInPieces')).toMatchObject({
      weight: 'wrong',
      text: expect.stringContaining('Extend one to the end of the other'),
      at: [expect.any(Number), expect.any(Number)],
    });
    expect(readNet(apart).points.map(({ totalHead }) => totalHead)).toEqual([null, null]);
    const other = withLines(inPieces(10, { head: 101.5 }), 'equipotential', (value, i) =>
      i === 4 ? { ...value, head: 102 } : value,
    );
    expect(readNet(other).state).toBe('unfinished');
  });
});

describe('a line that leaves the ground', () => {
  const beyond = (points: readonly SheetPoint[], by: number): SheetPoint[] => {
    const [a, b] = [points[1]!, points[0]!];
    const size = Math.hypot(b[0] - a[0], b[1] - a[1]);
    return [[b[0] + ((b[0] - a[0]) * by) / size, b[1] + ((b[1] - a[1]) * by) / size], ...points];
  };

  it('is a flow line that runs on above the bed', () => {
    const out = withLines(drawn(apron), 'flowLine', (value, i) =>
      i === 2 ? { ...value, points: beyond(value.points, 300) } : value,
    );
    expect(finding(out, 'lineLeavesRegion')).toMatchObject({
      weight: 'question',
      text: 'A flow line runs out of the ground through the headwater boundary. End it there.',
      at: [expect.any(Number), expect.any(Number)],
    });
  });

  it('is an equipotential that runs through a bed of another head, and withholds the figures', () => {
    const bed = withLines(drawn(pile, [[2, 95]]), 'equipotential', (value, i) => {
      if (i !== 8) return value;
      const [x, y] = value.points[value.points.length - 1]!;
      return { ...value, points: [...value.points, [x + 40, y - 300], [x + 80, y - 900]] };
    });
    const found = finding(bed, 'lineLeavesRegion');
    if (found !== null) expect(found.weight).toBe('wrong');
    expect(readNet(bed).findings.some(({ weight }) => weight === 'wrong' || weight === 'question')).toBe(
      true,
    );
  });

  it('is a flow line above the phreatic line', () => {
    const raised = withLines(drawn(parabola), 'flowLine', (value, i) =>
      i === 0 ? { ...value, points: value.points.map(([x, y]): SheetPoint => [x, y - 1200]) } : value,
    );
    expect(finding(raised, 'lineLeavesRegion')?.text).toMatch(/^A flow line/);
  });

  it('is none of a net drawn to its boundaries', () => {
    for (const exact of EXACT_NETS) expect(finding(drawn(exact), 'lineLeavesRegion')).toBeNull();
  });
});
