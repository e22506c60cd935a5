import { describe, expect, it } from 'vitest';
import { type LineInHand, liveHelpOf } from '#client/features/desk/model/live-help.ts';
import { readNet } from '#shared/compute/read-net.ts';
import {
  type DocumentEntity,
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
  type TracedLine,
} from '#shared/contract/document.ts';
import { documentWith, LINE_A, LINE_B, tracedLine } from '#tests/support/desk/desk-fixture.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const IN_HAND = 'ffffffff-0000-7000-8000-000000000000';
const nothingRead = { reading: null, hiddenKinds: [] } as const;

function inHand(
  points: SheetPoint[],
  index = points.length - 1,
  changes: Partial<TracedLine> = {},
): LineInHand {
  return { id: IN_HAND, value: tracedLine(points, { finished: false, ...changes }), points, index };
}

const LEVEL = tracedLine(
  [
    [0, 500],
    [500, 500],
    [1000, 500],
  ],
  { line: 'impervious' },
);

describe('what is told of a line while it is drawn', () => {
  it('is nothing before there is a segment, and where nothing is met', () => {
    const document = documentWith({ [LINE_A]: LEVEL });
    expect(liveHelpOf(inHand([[300, 100]]), { document, ...nothingRead }).meetings).toEqual([]);
    const away = liveHelpOf(
      inHand([
        [300, 100],
        [320, 200],
      ]),
      { document, ...nothingRead },
    );
    expect(away).toMatchObject({ meetings: [], cells: [] });
  });

  it('is the angle at the line that the segment ends on or crosses', () => {
    const document = documentWith({ [LINE_A]: LEVEL });
    const upright = liveHelpOf(
      inHand([
        [300, 100],
        [300, 500],
      ]),
      { document, ...nothingRead },
    );
    expect(upright.meetings).toMatchObject([{ kind: 'impervious', wantsRight: true }]);
    expect(upright.meetings[0]?.angleDeg).toBeCloseTo(90, 6);
    const slanting = liveHelpOf(
      inHand([
        [300, 100],
        [700, 600],
      ]),
      { document, ...nothingRead },
    );
    expect(slanting.meetings[0]?.angleDeg).toBeCloseTo((Math.atan2(5, 4) * 180) / Math.PI, 6);
  });

  it('asks for no right angle where boundaries meet, and none of a hidden line', () => {
    const document = documentWith({ [LINE_A]: LEVEL });
    const face = { line: 'submergedFace', water: 'headwater' } as const;
    const hand = inHand(
      [
        [300, 100],
        [400, 500],
      ],
      1,
      face,
    );
    expect(liveHelpOf(hand, { document, ...nothingRead }).meetings).toMatchObject([{ wantsRight: false }]);
    expect(liveHelpOf(hand, { document, reading: null, hiddenKinds: ['impervious'] }).meetings).toEqual([]);
  });

  it('is judged in the transformed section, and not at all where the soils share none', () => {
    const document = documentWith({
      [LINE_A]: LEVEL,
      [LINE_B]: tracedLine(
        [
          [0, 0],
          [800, 800],
        ],
        { line: 'flowLine' },
      ),
    });
    const frame = (kind: 'transformed' | 'none') =>
      ({ frame: { kind, matrix: [0.5, 0, 0, 1] }, soils: null }) as unknown as ReturnType<typeof readNet>;
    const hand = inHand([
      [400, 200],
      [400, 460],
    ]);
    const seen = liveHelpOf(hand, { document, reading: frame('transformed'), hiddenKinds: [] });
    // Half as wide, the flow line falls by 2 in 1, and an upright line meets it at atan(1/2).
    expect(seen.meetings[0]?.angleDeg).toBeCloseTo((Math.atan(0.5) * 180) / Math.PI, 6);
    const apart = liveHelpOf(hand, { document, reading: frame('none'), hiddenKinds: [] });
    expect(apart.meetings[0]?.wantsRight).toBe(false);
    expect(apart.cells).toEqual([]);
  });

  it('counts a base that is traced in pieces as one side of a cell', () => {
    const piece = (from: number, to: number) =>
      tracedLine(
        [
          [from, 500],
          [to, 500],
        ],
        { line: 'impervious' },
      );
    const values: Record<string, DocumentEntity> = {
      [LINE_A]: piece(0, 350),
      [LINE_B]: piece(350.5, 1000),
      '0000000c-0000-7000-8000-000000000000': tracedLine(
        [
          [0, 400],
          [1000, 400],
        ],
        { line: 'flowLine' },
      ),
      '0000000d-0000-7000-8000-000000000000': tracedLine([
        [400, 390],
        [400, 500],
      ]),
    };
    const document = documentWith(values);
    const help = liveHelpOf(
      inHand([
        [300, 390],
        [300, 500],
      ]),
      { document, ...nothingRead },
    );
    expect(help.wantedRatio).toBe(1);
    expect(help.cells).toHaveLength(1);
    expect(help.cells[0]?.ratio).toBeCloseTo(1, 6);
  });

  it.each(EXACT_NETS)(
    'agrees with the closed form of the $name while a line is drawn again',
    ({ net, pxPerUnit }) => {
      const document = exactNetDocument(net, { pxPerUnit });
      const reading = readNet(document);
      const ratios: number[] = [];
      const angles: number[] = [];
      for (const { id, value } of entitiesOf(document, 'line')) {
        if (value.line !== 'equipotential') continue;
        const { entities } = document;
        const { [id]: _, ...rest } = entities;
        const without: FlowNetDocument = { ...document, entities: rest };
        for (let n = 2; n < value.points.length; n += 1) {
          const hand = { id, value, points: value.points.slice(0, n + 1), index: n };
          const help = liveHelpOf(hand, { document: without, reading, hiddenKinds: [] });
          ratios.push(...help.cells.map(({ ratio }) => ratio));
          angles.push(
            ...help.meetings.filter(({ wantsRight }) => wantsRight).map(({ angleDeg }) => angleDeg),
          );
        }
      }
      expect(ratios.length).toBeGreaterThan(30);
      expect(angles.length).toBeGreaterThan(30);
      const median = (all: number[]) => all.sort((a, b) => a - b)[all.length >> 1]!;
      expect(Math.abs(median(ratios) - 1)).toBeLessThan(0.03);
      // Segments of 14 px are chords of the line: they turn from its tangent by half the bend between two vertices.
      expect(median(angles)).toBeGreaterThan(87);
    },
  );

  it('answers within 2 ms on a net of 200 lines with 5,000 vertices', () => {
    const values: Record<string, DocumentEntity> = {};
    const idOf = (i: number) => `0000${String(i).padStart(4, '0')}-0000-7000-8000-000000000000`;
    for (let i = 0; i < 100; i += 1) {
      const upright = Array.from({ length: 25 }, (_, k): SheetPoint => [40 * i + 2 * Math.sin(k), 125 * k]);
      const level = Array.from({ length: 25 }, (_, k): SheetPoint => [165 * k, 30 * i + Math.sin(k)]);
      values[idOf(i)] = tracedLine(upright);
      values[idOf(100 + i)] = tracedLine(level, { line: 'flowLine' });
    }
    const document = documentWith(values);
    const points = Array.from({ length: 60 }, (_, k): SheetPoint => [2020 + Math.sin(k), 10 + 45 * k]);
    const ask = (k: number) =>
      liveHelpOf(inHand([...points, [2020 + (k % 9), 2780 - (k % 5)]]), { document, ...nothingRead });
    expect(ask(0).cells).toHaveLength(2);
    // The processor's time: the clock's depends on what else the machine does.
    const began = process.cpuUsage();
    for (let k = 0; k < 300; k += 1) ask(k);
    expect(process.cpuUsage(began).user / 1000 / 300).toBeLessThan(2);
  });
});
