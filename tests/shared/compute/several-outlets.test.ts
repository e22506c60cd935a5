import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { netReading } from '#shared/contract/reading.ts';
import { apronDrainDocument, apronDrainNet } from '#tests/support/exact-nets/apron-drain-net.ts';
import { changed, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { drawnCarelessly } from '#tests/support/exact-nets/redrawn.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';
import { type SketchedLine, sketchedNet } from '#tests/support/exact-nets/sketched-net.ts';

const codesOf = (reading: ReturnType<typeof readNet>) =>
  reading.findings.filter((found) => found.weight !== 'note').map((found) => found.code);

/** Codes of what withholds the figures: a net sketched by straight pieces has cells that may well be asked about. */
const gravesOf = (reading: ReturnType<typeof readNet>) =>
  reading.findings.filter(({ weight }) => weight === 'wrong' || weight === 'missing').map(({ code }) => code);

describe.each([
  ['between two drops', 100.2],
  ['at a whole drop, where an equipotential ends on the bed', 100],
])('a drain below a tailwater %s', (_, tailwater) => {
  const net = apronDrainNet({ tailwater, drainHead: 98.25 });
  const places = net.places(40, seededRandom(4));
  const document = apronDrainDocument(net, { readings: places.map((at) => ({ at, clicked: true })) });
  const reading = readNet(document);

  it('is read, and its answer keeps to the schema', () => {
    // The tailwater takes two thirds of a channel by the closed form; counted, it is a whole one.
    expect(codesOf(reading)).toEqual(tailwater === 100 ? [] : ['lastChannelInPart']);
    expect(reading.state).toBe('read');
    expect(netReading.safeParse(reading).error?.issues ?? []).toEqual([]);
  });

  it('has no single count of drops, but one to each outlet at one head per drop', () => {
    const { drops, shapeFactor, headPerDrop, outlets } = reading.quantities;
    expect([drops, shapeFactor]).toEqual([null, null]);
    expect(headPerDrop).toBeCloseTo(0.5, 9);
    expect(outlets.map(({ label }) => label)).toEqual(['the drain', 'the tailwater boundary']);
    expect(outlets[0]!.drops).toBeCloseTo((106 - 98.25) / 0.5, 9);
    expect(outlets[1]!.drops).toBeCloseTo((106 - tailwater) / 0.5, 9);
    expect(outlets[1]!.headLost).toBeCloseTo(106 - tailwater, 9);
  });

  it('has the heads of the closed form on every equipotential', () => {
    const heads = reading.lines.filter(({ source }) => source === 'counted').map(({ head }) => head!);
    expect(heads).toHaveLength(15);
    heads.forEach((head, i) => {
      expect(head).toBeCloseTo(106 - 0.5 * (i + 1), 9);
    });
  });

  it('parts the channels of the headwater between them', () => {
    const { channels, outlets } = reading.quantities;
    // The closed form gives the drain ten channels; the outermost one that the tailwater takes is a part channel.
    expect(net.flows.drain).toBe(10);
    expect(channels).toBe(Math.ceil(net.flows.headwater));
    expect(outlets.map((outlet) => outlet.channels)).toEqual([10, 1]);
    const stated = changed(document, 'netCount', (value) => ({ ...value, channels: net.flows.headwater }));
    const withPart = readNet(stated).quantities;
    expect(withPart.outlets[1]!.channels).toBeCloseTo(net.flows.tailwater, 9);
    // q = k·Δh·Nf with k = 2.5e-6 m/s.
    expect(withPart.outlets[0]!.seepage).toBeCloseTo(2.5e-6 * 0.5 * 10, 15);
    expect(withPart.seepage).toBeCloseTo(2.5e-6 * 0.5 * net.flows.headwater, 15);
  });

  it('is read by the field within 0.04 drop of the closed form, beside the bed that gives and takes too', () => {
    reading.points.forEach((point, i) => {
      const error = Math.abs(point.totalHead! - net.headAt(...places[i]!)) / 0.5;
      expect(error, `${places[i]}: ${point.explanation}`).toBeLessThan(0.04);
    });
  });

  it('is read alike when the tailwater is a water of its own', () => {
    const own = withLines(document, 'submergedFace', (value) =>
      value.water === 'tailwater' ? { ...value, water: null, head: tailwater } : value,
    );
    const same = readNet(changed(own, 'waterLevels', (value) => ({ ...value, tailwater: null })));
    expect(codesOf(same)).toEqual(codesOf(reading));
    expect(same.points.map(({ totalHead }) => totalHead)).toEqual(
      reading.points.map(({ totalHead }) => totalHead),
    );
  });
});

describe('a drain below the tailwater, carelessly traced', () => {
  const net = apronDrainNet({ tailwater: 100.2, drainHead: 98.25 });
  // At the edges of the floor the gradient is endless, and a pixel of tracing is a good part of a drop.
  const isAtEdge = ([x]: readonly [number, number]) => Math.abs(Math.abs(x) - 10) < 0.6;

  it.each([4, 20])('with gaps of up to %i px is read right or not at all', (gapPx) => {
    for (let seed = 1; seed <= 4; seed += 1) {
      const places = net.places(25, seededRandom(seed)).filter((at) => !isAtEdge(at));
      const readings = places.map((at) => ({ at, clicked: true }));
      const careful = apronDrainDocument(net, { jitterPx: 1.5, seed, readings });
      readNet(drawnCarelessly(careful, gapPx, seed)).points.forEach((point, i) => {
        if (point.totalHead === null) return;
        const error = Math.abs(point.totalHead - net.headAt(...places[i]!)) / 0.5;
        expect(error, `seed ${seed}, ${places[i]}: ${point.explanation}`).toBeLessThan(0.25);
      });
    }
  });
});

describe('within 20 px of the edges of the floor', () => {
  const net = apronDrainNet({ tailwater: 100.2, drainHead: 98.25 });

  // Unasked-for errors that are left: floor and bed end too far to the same side, which nothing on the drawing tells.
  it.each([
    [0, 0.12],
    [20, 0.25],
  ])(
    'with gaps of up to %i px, what the trace puts wrong by more than %f drop is questioned',
    (gapPx, most) => {
      let questioned = 0;
      for (let seed = 1; seed <= 3; seed += 1) {
        const random = seededRandom(seed + 50);
        const places = Array.from({ length: 60 }, (_, i): [number, number] => {
          const [away, turn] = [(1 + 19 * random()) / 50, Math.PI * (1 + random())];
          return [(i % 2 === 0 ? -10 : 10) + away * Math.cos(turn), 98 + away * Math.sin(turn)];
        });
        const readings = places.map((at) => ({ at, clicked: true }));
        const traced = apronDrainDocument(net, { jitterPx: 1.5, seed, readings });
        const { points } = readNet(gapPx === 0 ? traced : drawnCarelessly(traced, gapPx, seed));
        points.forEach((point, i) => {
          if (point.totalHead === null) return;
          const error = Math.abs(point.totalHead - net.headAt(...places[i]!)) / 0.5;
          if (point.findings.length > 0) questioned += 1;
          else expect(error, `seed ${seed}, ${places[i]}: ${point.explanation}`).toBeLessThan(most);
        });
      }
      expect(questioned).toBeGreaterThan(90);
    },
  );
});

describe('levels that the order denies', () => {
  const net = apronDrainNet({ tailwater: 100.2, drainHead: 98.25 });
  const document = apronDrainDocument(net, { readings: [{ at: [0, 90], clicked: true }] });

  it('withhold every figure where the flow passes a boundary at another head', () => {
    const moved = changed(document, 'waterLevels', (value) => ({ ...value, tailwater: 101.6 }));
    const reading = readNet(moved);
    expect(reading.findings.find((found) => found.weight === 'wrong')).toMatchObject({
      code: 'outletOutOfOrder',
      text: expect.stringContaining('between line 11 and line 12'),
    });
    expect(reading.points[0]!.totalHead).toBeNull();
    expect(reading.quantities.outlets).toEqual([]);
  });

  it('ask for the lines that lead to a drain when they are left out', () => {
    const without = withLines(document, 'equipotential', (value, i) => (i > 10 ? null : value));
    expect(codesOf(readNet(without))).toContain('countDisagrees');
  });
});

const ground: SketchedLine[] = [
  {
    line: 'impervious',
    through: [
      [0, 0],
      [12, 0],
    ],
  },
];
const upright = (x: number, more: Partial<SketchedLine> = {}): SketchedLine => ({
  line: 'equipotential',
  through: [
    [x, 0],
    [x, 4],
  ],
  ...more,
});

describe('water that parts to two sides', () => {
  // A canal on a shallow layer: one line round it, then lines of their own to a drain on either side.
  const canal = (extra: readonly SketchedLine[] = []): SketchedLine[] => [
    ...ground,
    {
      line: 'impervious',
      through: [
        [0, 4],
        [5.5, 4],
      ],
    },
    {
      line: 'impervious',
      through: [
        [6.5, 4],
        [12, 4],
      ],
    },
    {
      line: 'submergedFace',
      water: 'headwater',
      through: [
        [5.5, 4],
        [6.5, 4],
      ],
    },
    {
      line: 'drain',
      name: 'West',
      head: 6.5,
      through: [
        [0, 0],
        [0, 4],
      ],
    },
    {
      line: 'drain',
      name: 'East',
      head: 5.8,
      through: [
        [12, 0],
        [12, 4],
      ],
    },
    {
      line: 'equipotential',
      through: [
        [4.5, 4],
        [4.7, 2.8],
        [6, 2.2],
        [7.3, 2.8],
        [7.5, 4],
      ],
    },
    upright(3.2),
    upright(1.2),
    upright(8.2),
    upright(9.6),
    upright(11),
    ...extra,
  ];
  const read = (lines: readonly SketchedLine[], drops = 4.2) =>
    readNet(
      sketchedNet(lines, { headwater: 10, tailwater: null, drops }, [
        [6, 1],
        [2, 2],
        [10.3, 2],
      ]),
    );

  it('is counted along each side by the head per drop of the whole net', () => {
    const reading = read(canal());
    expect(gravesOf(reading)).toEqual([]);
    const { outlets, headPerDrop } = reading.quantities;
    expect(headPerDrop).toBeCloseTo(1, 9);
    expect(outlets.map(({ label, drops }) => [label, drops])).toEqual([
      ['East', 4.2],
      ['West', 3.5],
    ]);
    const drops = reading.lines.filter(({ source }) => source === 'counted').map((line) => line.drops);
    expect(drops).toEqual([1, 2, 3, 2, 3, 4]);
  });

  it('is read below the fork, where three lines bound the ground, and on both sides', () => {
    const [below, west, east] = read(canal()).points.map((point) => point.dropsLost!);
    expect(below).toBeGreaterThan(1);
    expect(below).toBeLessThan(2);
    expect(west).toBeGreaterThan(2);
    expect(west).toBeLessThan(3);
    expect(east).toBeGreaterThan(3);
    expect(east).toBeLessThan(4);
  });

  it('withholds the figures when a line is missing on one side', () => {
    const reading = read(canal().filter(({ through }) => through[0]![0] !== 1.2));
    expect(reading.findings.find((found) => found.code === 'countDisagrees')?.text).toContain('West');
    expect(reading.points.every(({ totalHead }) => totalHead === null)).toBe(true);
  });

  it('honours a head typed on a side, and reports one that contradicts its place', () => {
    const typed = (head: number) =>
      canal().map((line) => (line.through[0]![0] === 3.2 ? { ...line, head } : line));
    expect(gravesOf(read(typed(8)))).toEqual([]);
    expect(gravesOf(read(typed(5.5)))).toContain('typedOutOfOrder');
  });
});

describe('water that parts, with any number of lines on its two sides', () => {
  const side = fc.record({
    lines: fc.integer({ min: 1, max: 6 }),
    part: fc.double({ min: 0.1, max: 1, noNaN: true }),
  });
  /** Uprights evenly between two offsets, both left out. */
  const uprights = (from: number, to: number, count: number) =>
    Array.from({ length: count }, (_, i) => upright(from + ((to - from) * (i + 1)) / (count + 1)));

  it('falls by one drop from line to line on each, and ends on the part drop of its outlet', () => {
    fc.assert(
      fc.property(side, side, (west, east) => {
        const dropsTo = ({ lines, part }: typeof west) => 1 + lines + part;
        const drops = Math.max(dropsTo(west), dropsTo(east));
        const lines: SketchedLine[] = [
          ...ground,
          {
            line: 'impervious',
            through: [
              [0, 4],
              [5.5, 4],
            ],
          },
          {
            line: 'impervious',
            through: [
              [6.5, 4],
              [12, 4],
            ],
          },
          {
            line: 'submergedFace',
            water: 'headwater',
            through: [
              [5.5, 4],
              [6.5, 4],
            ],
          },
          {
            line: 'drain',
            name: 'West',
            head: 20 - dropsTo(west),
            through: [
              [0, 0],
              [0, 4],
            ],
          },
          {
            line: 'drain',
            name: 'East',
            head: 20 - dropsTo(east),
            through: [
              [12, 0],
              [12, 4],
            ],
          },
          {
            line: 'equipotential',
            through: [
              [4.5, 4],
              [4.7, 2.8],
              [6, 2.2],
              [7.3, 2.8],
              [7.5, 4],
            ],
          },
          ...uprights(4.2, 0, west.lines),
          ...uprights(7.8, 12, east.lines),
        ];
        const reading = readNet(sketchedNet(lines, { headwater: 20, tailwater: null, drops }));
        expect(gravesOf(reading)).toEqual([]);
        const counted = reading.lines.filter(({ source }) => source === 'counted').map((line) => line.drops);
        const along = ({ lines: count }: typeof west) => Array.from({ length: count }, (_, i) => i + 2);
        expect(counted).toEqual([1, ...along(west), ...along(east)]);
        for (const outlet of reading.quantities.outlets)
          expect(outlet.drops).toBeCloseTo(dropsTo(outlet.label === 'West' ? west : east), 6);
      }),
      { numRuns: 25 },
    );
  });
});

describe('a lower water that feeds a drain from its own side', () => {
  // A drain in the roof of a shallow layer draws water from two reservoirs; the lower one begins within a drop.
  const lines: SketchedLine[] = [
    ...ground,
    {
      line: 'impervious',
      through: [
        [0, 4],
        [5.5, 4],
      ],
    },
    {
      line: 'impervious',
      through: [
        [6.5, 4],
        [12, 4],
      ],
    },
    {
      line: 'submergedFace',
      water: 'headwater',
      through: [
        [0, 0],
        [0, 4],
      ],
    },
    {
      line: 'submergedFace',
      name: 'Lower pool',
      head: 8.5,
      through: [
        [12, 0],
        [12, 4],
      ],
    },
    {
      line: 'drain',
      head: 5.4,
      through: [
        [5.5, 4],
        [6.5, 4],
      ],
    },
    {
      line: 'equipotential',
      through: [
        [4.5, 4],
        [4.7, 2.8],
        [6, 2.2],
        [7.3, 2.8],
        [7.5, 4],
      ],
    },
    upright(1),
    upright(2.2),
    upright(3.6),
    upright(9.5),
    upright(8.4),
  ];
  const reading = readNet(
    sketchedNet(lines, { headwater: 10, tailwater: null, drops: 4.6 }, [
      [10.7, 2],
      [9, 2],
    ]),
  );

  it('is counted back from the fork', () => {
    expect(gravesOf(reading)).toEqual([]);
    const counted = reading.lines.filter(({ source }) => source === 'counted').map((line) => line.drops);
    expect(counted).toEqual([4, 1, 2, 3, 2, 3]);
    expect(reading.quantities.outlets.map(({ label, drops }) => [label, drops])).toEqual([
      ['the drain', 4.6],
      ['Lower pool', 1.5],
    ]);
  });

  it('is read between its level and that of the fork', () => {
    const [first, second] = reading.points.map((point) => point.totalHead!);
    expect(first).toBeLessThan(8.5);
    expect(first).toBeGreaterThan(8);
    expect(second).toBeLessThan(8);
    expect(second).toBeGreaterThan(7);
  });

  it('is asked for its line when one is missing', () => {
    const fewer = lines.filter(({ through }) => through[0]![0] !== 9.5);
    const missing = readNet(sketchedNet(fewer, { headwater: 10, tailwater: null, drops: 4.6 }));
    expect(missing.findings.find((found) => found.code === 'countDisagrees')?.text).toContain('Lower pool');
  });
});
