import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import { netCheckOf } from '#shared/compute/net-check/net-check.ts';
import { questionNetCheck } from '#shared/compute/net-check/net-check-findings.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type NetCheckReading, netCheckReading } from '#shared/contract/reading-net-check.ts';
import { arbitraryDocument } from '#tests/support/arbitrary-document.ts';
import { changed, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { cellsOfDocument, checkInputsOf, checkOfDocument } from '#tests/support/exact-nets/exact-cells.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { freeOutflowNet } from '#tests/support/exact-nets/free-outflow-net.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

const [parabola, apron, pile] = EXACT_NETS as [Entry, Entry, Entry];
type Entry = (typeof EXACT_NETS)[number];

const drawn = ({ net, pxPerUnit }: Entry, tracing: Tracing = {}): FlowNetDocument =>
  exactNetDocument(net, { pxPerUnit, jitterPx: 1.5, ...tracing });

/** The net with one equipotential moved along the flow by so many drops, which may depend on the place across it. */
function withMoved(entry: Entry, index: number, by: (channel: number) => number): Entry {
  const { net } = entry;
  const equipotentials = net.lines.filter(({ line }) => line === 'equipotential');
  const moved: ExactNet = {
    ...net,
    lines: net.lines.map((line) =>
      line === equipotentials[index]
        ? {
            ...line,
            at: (part) => net.placeAt(index + 1 + by(part * net.channels), part * net.channels),
          }
        : line,
    ),
  };
  return { ...entry, net: moved };
}

/** Ids of the equipotentials in the order of drawing, which is that of the flow. */
const equipotentialIds = (document: FlowNetDocument) =>
  Object.values(document.entities)
    .filter(({ value }) => value.kind === 'line' && value.line === 'equipotential')
    .map(({ id }) => id);

const poorCells = (check: NetCheckReading) => check.cells.filter(({ judgement }) => judgement === 'poor');
const poorAngles = (check: NetCheckReading) => check.meetings.filter(({ judgement }) => judgement === 'poor');

describe.each(EXACT_NETS)('check of an exact net: $name', (entry) => {
  const { net } = entry;

  it('finds nothing, however the hand trembles by 1.5 px', () => {
    for (let seed = 1; seed <= 4; seed += 1) {
      const check = checkOfDocument(drawn(entry, { seed, spacingPx: seed % 2 === 0 ? 14 : 30 }));
      expect(check.faults).toEqual([]);
      expect(check.summary).toMatchObject({ cellsPoor: 0, anglesPoor: 0, channelsPoor: 0 });
      expect(check.summary.cellsJudged).toBeGreaterThan(0.9 * net.drops * net.channels);
      expect(check.summary.text).toMatch(/^\d+ cells square, no angle off square$/);
      expect(questionNetCheck(check, 'SI')).toEqual([]);
    }
  });

  it('measures the flow of the closed form, q = kH·Nf/Nd, within 1.5 %', () => {
    const check = checkOfDocument(drawn(entry), { seepage: 2e-6, channels: net.channels });
    expect(Math.abs(check.measuredFlow! / net.channels - 1)).toBeLessThan(0.015);
    expect(Math.abs(check.measuredSeepage! / 2e-6 - 1)).toBeLessThan(0.015);
    expect(Math.abs(check.measuredRatio! - 1)).toBeLessThan(0.02);
    for (const { share } of check.channels) expect(Math.abs(share! - 1)).toBeLessThan(0.03);
  });

  it('finds an equipotential that lies 0.3 of a cell from its place, at that place and with that effect', () => {
    for (const index of [2, 5]) {
      const moved = withMoved(entry, index, () => 0.3);
      const document = drawn(moved);
      const [before, line, after] = equipotentialIds(document).slice(index - 1, index + 2);
      const check = checkOfDocument(document);
      const poor = poorCells(check);
      expect(poor.length).toBeGreaterThanOrEqual(Math.floor(1.3 * net.channels));
      for (const cell of poor) {
        expect([
          [before, line],
          [line, after],
        ]).toContainEqual([cell.before, cell.after]);
        // One cell is 1.3 times as long, the other 0.7: the head at the line is off by 0.3 drop.
        expect(cell.effect!.drops).toBeGreaterThan(0.2);
        expect(cell.effect!.drops).toBeLessThan(0.4);
        const drop = (net.headwater - net.outHead) / net.drops;
        expect(cell.effect!.pressure! / (9.81 * drop * cell.effect!.drops)).toBeCloseTo(1, 1);
      }
      const [found] = questionNetCheck(check, 'SI');
      expect(found).toMatchObject({ code: 'cellsNotSquare', weight: 'question', cell: 'netCheck' });
      expect(found!.entityIds).toContain(line);
      expect(found!.at).toEqual(check.faults[0]!.at);
    }
  });

  it('finds an equipotential that winds through a flow line at 70 degrees, and only there', () => {
    // A shift of A·sin(πv) drops makes the angle arctan(Aπ) with the square at the flow line v, in any square net.
    const shift = Math.tan((20 * Math.PI) / 180) / Math.PI;
    const moved = withMoved(entry, 2, (channel) =>
      channel > 0 && channel < 2 ? -shift * Math.sin(Math.PI * (channel - 1)) : 0,
    );
    const check = checkOfDocument(drawn(moved, { jitterPx: 0.5, spacingPx: 8 }));
    const crossing = poorAngles(check).filter(({ kind }) => kind === 'crossing');
    expect(crossing).toHaveLength(1);
    expect(crossing[0]!.angleDeg).toBeGreaterThan(66);
    expect(crossing[0]!.angleDeg).toBeLessThan(75);
    expect(crossing[0]!.effect.drops).toBeCloseTo(0.5 * Math.tan((20 * Math.PI) / 180), 1);
    expect(check.summary.text).toMatch(/1 crossing at (6[6-9]|7[0-5])°/);
  });

  it('judges alike however the sheet is turned, shifted and mirrored', () => {
    const moved = withMoved(entry, 3, (channel) => 0.3 * Math.cos(channel));
    const plain = checkOfDocument(drawn(moved, { jitterPx: 0 }));
    for (const tracing of [
      { turnDeg: 30, centre: [4000, -1500] },
      { mirrored: true, turnDeg: -20 },
    ] as Tracing[]) {
      const check = checkOfDocument(drawn(moved, { jitterPx: 0, ...tracing }));
      expect(check.summary).toEqual(plain.summary);
      const cellOf = ({ before, after, channel }: NetCheckReading['cells'][number]) =>
        check.cells.find(
          (other) =>
            other.before === before &&
            other.after === after &&
            // Left of the flow becomes right of it in the mirror.
            other.channel === (tracing.mirrored ? net.channels - 1 - channel : channel),
        );
      for (const cell of plain.cells) {
        expect(cellOf(cell)!.ratio).toBeCloseTo(cell.ratio, 6);
        expect(cellOf(cell)!.judgement).toBe(cell.judgement);
      }
      for (const { lines, angleDeg, plusMinusDeg } of plain.meetings) {
        const other = check.meetings.find((each) => each.lines.join() === lines.join());
        // A vertex just at the end of the window may be counted in or not, which matters less than the tremor.
        expect(Math.abs(other!.angleDeg - angleDeg)).toBeLessThan(Math.max(0.5, plusMinusDeg / 2));
      }
    }
  });

  it('keeps to its schema', () => {
    const check = checkOfDocument(drawn(withMoved(entry, 2, () => 0.4)));
    expect(netCheckReading.parse(check)).toEqual(check);
  });
});

describe('angles at boundaries', () => {
  it('are found where an equipotential meets the base aslant', () => {
    const { net } = parabola;
    // Near the base (channel Nf) the line runs off by a slope of 0.6 in squares: 59 degrees there.
    const moved = withMoved(parabola, 4, (channel) => 0.6 * Math.max(0, channel - (net.channels - 0.6)));
    const check = checkOfDocument(drawn(moved));
    const poor = poorAngles(check);
    expect(poor.map(({ kind }) => kind)).toEqual(['equipotentialAtImpervious']);
    expect(Math.abs(poor[0]!.angleDeg - 59)).toBeLessThan(12);
    expect(questionNetCheck(check, 'US').map(({ code }) => code)).toContain('anglesNotSquare');
    expect(check.summary.text).toMatch(/1 boundary angle at \d\d°/);
  });

  it('are found where an equipotential meets the phreatic line aslant, and where a flow line meets the bed so', () => {
    const atPhreatic = withMoved(parabola, 4, (channel) => 0.6 * Math.max(0, 0.6 - channel));
    expect(poorAngles(checkOfDocument(drawn(atPhreatic))).map(({ kind }) => kind)).toEqual([
      'equipotentialAtPhreatic',
    ]);
    const { net } = pile;
    const flowLines = net.lines.filter(({ line }) => line === 'flowLine');
    const slanted: ExactNet = {
      ...net,
      lines: net.lines.map((line) =>
        line === flowLines[1]
          ? {
              ...line,
              at: (part) => {
                const drops = part * net.drops;
                return net.placeAt(drops, 2 + 0.7 * Math.max(0, 0.6 - drops));
              },
            }
          : line,
      ),
    };
    const poor = poorAngles(checkOfDocument(drawn({ ...pile, net: slanted })));
    expect(poor.map(({ kind }) => kind)).toEqual(['flowLineAtPotential']);
  });
});

describe('channels and the common ratio', () => {
  it('measure the published flow round a sheet pile (case 1A-07, Harr 1962)', () => {
    const check = checkOfDocument(drawn(pile, { jitterPx: 0 }));
    const qOverKH = check.measuredFlow! / pile.net.drops;
    expect(Math.abs(qOverKH / PUBLISHED['1A-07'].q_over_kH - 1)).toBeLessThan(0.01);
  });

  it('tell of a flow line out of place, by the flows on its two sides', () => {
    const { net } = apron;
    const flowLines = net.lines.filter(({ line }) => line === 'flowLine');
    const moved: ExactNet = {
      ...net,
      lines: net.lines.map((line) =>
        line === flowLines[2] ? { ...line, at: (part) => net.placeAt(part * net.drops, 3.35) } : line,
      ),
    };
    const check = checkOfDocument(drawn({ ...apron, net: moved }));
    const poor = check.channels.filter(({ judgement }) => judgement === 'poor');
    expect(poor.map(({ share }) => Number(share!.toFixed(1))).sort()).toEqual([0.7, 1.3]);
    expect(questionNetCheck(check, 'SI').map(({ code }) => code)).toContain('channelFlowsDiffer');
    expect(check.summary.text).toContain('2 channels carry another flow');
  });

  it('judge by the measured ratio, and say so, when another is entered than was drawn', () => {
    const document = changed(drawn(apron), 'netCount', (count) => ({ ...count, cellRatio: 2 }));
    const check = checkOfDocument(document);
    expect(check.judgedRatio).toBe(check.measuredRatio);
    expect(poorCells(check)).toEqual([]);
    expect(questionNetCheck(check, 'SI')).toMatchObject([{ code: 'cellRatioDiffers', cell: 'channels' }]);
  });

  it('take rectangles of one ratio for a good net', () => {
    // Every second equipotential of the pile's net: B/L = 1/2.
    const halved = withLines(drawn(pile), 'equipotential', (line, i) => (i % 2 === 1 ? line : null));
    const document = changed(halved, 'netCount', (count) => ({ ...count, drops: 5, cellRatio: 0.5 }));
    const check = checkOfDocument(document);
    expect(poorCells(check)).toEqual([]);
    expect(check.summary.text).toContain('of B/L 0.5');
  });

  it('expect half the ratio where the soil is twice as permeable', () => {
    const inputs = checkInputsOf(drawn(apron));
    const check = netCheckOf({ ...inputs, relativeK: ([x]) => (x < 2450 ? 1 : 2) });
    const { cells } = check;
    expect(cells.some(({ reason }) => reason === 'severalSoils')).toBe(true);
    for (const cell of cells.filter(({ judgement }) => judgement !== 'notJudged')) {
      expect(cell.expected! * (cell.at[0] < 2450 ? 1 : 2)).toBeCloseTo(check.judgedRatio, 9);
    }
  });

  it('judge no cell whose soil is not known, and none without a common section', () => {
    const inputs = checkInputsOf(drawn(apron));
    const unknown = netCheckOf({ ...inputs, relativeK: () => null });
    expect(new Set(unknown.cells.map(({ reason }) => reason))).toEqual(new Set(['unknownSoil', 'singular']));
    const none = netCheckOf({ ...inputs, hasCommonSection: false });
    expect(none.summary).toMatchObject({ cellsJudged: 0, anglesJudged: 0 });
    expect(none.summary.text).toContain('share no transformed section');
    expect(questionNetCheck(none, 'SI')).toEqual([]);
  });
});

describe('a section that is not isotropic', () => {
  /** The apron's net as it lies in a ground with kh/kv = 4, that is twice as long along the bedding (Samsioe 1931). */
  const stretched: ExactNet = {
    ...apron.net,
    lines: apron.net.lines.map((line) => ({
      ...line,
      at: (part) => {
        const [offset, elevation] = line.at(part);
        return [2 * offset, elevation];
      },
    })),
  };
  const document = exactNetDocument(stretched, { pxPerUnit: apron.pxPerUnit, jitterPx: 1 });

  it('is judged in its transformed section, where its cells are squares', () => {
    const layered = changed(document, 'permeability', (value) => ({ ...value, k: 4e-6, kv: 1e-6 }));
    const { netCheck, quantities } = readNet(layered);
    expect(netCheck!.faults).toEqual([]);
    expect(netCheck!.summary.cellsJudged).toBeGreaterThan(75);
    expect(Math.abs(netCheck!.measuredRatio! - 1)).toBeLessThan(0.02);
    // q = √(kh·kv)·H·Nf/Nd, by the cells as by the count.
    const seepage = (2e-6 * 6 * 7) / 12;
    expect(Math.abs(quantities.seepage! / seepage - 1)).toBeLessThan(1e-3);
    expect(Math.abs(netCheck!.measuredSeepage! / seepage - 1)).toBeLessThan(0.02);
    // The lengths are those of the natural section: under the middle of the apron the flow runs along the bedding.
    const middle = netCheck!.cells.find(({ before }) => before === equipotentialIds(document)[5])!;
    expect(middle.length / middle.width).toBeGreaterThan(1.8);
  });

  it('is told to be no net of squares when its anisotropy is not said', () => {
    const { netCheck } = readNet(document);
    expect(netCheck!.summary.cellsPoor).toBeGreaterThan(20);
  });
});

describe('a net that is not finished', () => {
  it('is checked before its drops are counted, with no effect in pressure where there is no head', () => {
    const document = changed(drawn(withMoved(apron, 4, () => 0.4)), 'netCount', (count) => ({
      ...count,
      drops: null,
    }));
    const check = checkOfDocument(document);
    expect(poorCells(check).length).toBeGreaterThan(6);
    for (const { effect } of poorCells(check)) expect(effect!.pressure).toBeNull();
  });

  it('without flow lines has no cells and says what to do', () => {
    const check = checkOfDocument(withLines(drawn(apron), 'flowLine', () => null));
    expect(check.hasChannels).toBe(false);
    expect(check.cells).toEqual([]);
    expect(check.measuredFlow).toBeNull();
    expect(check.summary.text).toBe('No cells to judge: trace flow lines and boundaries');
  });

  it('without flow lines between two boundaries compares whole intervals, not the ratio entered', () => {
    const check = checkOfDocument(withLines(drawn(parabola), 'flowLine', () => null));
    expect(check.cells).toHaveLength(parabola.net.drops);
    // Three channels of squares: B/L = 3.
    expect(Math.abs(check.measuredRatio! - 3)).toBeLessThan(0.1);
    expect(questionNetCheck(check, 'SI')).toEqual([]);
    expect(check.summary.text).toBe('9 cells alike, no angle off square');
  });

  it('with a face of free outflow is checked away from it', () => {
    const check = checkOfDocument(freeOutflowNet([]));
    expect(check.cells.some(({ reason }) => reason === 'freeFace')).toBe(true);
    expect(check.meetings.every(({ kind }) => kind !== 'flowLineAtPotential')).toBe(true);
  });
});

it('lists the faults by their effect, the greatest first', () => {
  const check = checkOfDocument(drawn(withMoved(apron, 4, (channel) => 0.1 * channel)));
  const sizes = check.faults.map(({ effect }) => effect.head!);
  expect(sizes.length).toBeGreaterThan(4);
  expect(sizes).toEqual([...sizes].sort((a, b) => b - a));
});

describe('whatever the document', () => {
  it('is answered, and the answer keeps to its schema', () => {
    fc.assert(
      fc.property(arbitraryDocument(), (document) => {
        const { netCheck } = readNet(document);
        if (netCheck !== null) netCheckReading.parse(netCheck);
      }),
      { numRuns: 100 },
    );
  });

  it('is answered for flow lines that wander', () => {
    const wild = withLines(drawn(pile), 'flowLine', (value, i) => ({
      ...value,
      points: value.points.map(([x, y], k): [number, number] => [
        x + ((i * 977 + k * 613) % 400),
        y + ((k * 331) % 300),
      ]),
    }));
    const check = checkOfDocument(wild);
    expect(netCheckReading.parse(check)).toEqual(check);
    expect(cellsOfDocument(wild).net.rails.length).toBeGreaterThan(0);
  });

  it('is answered for a stated accuracy of nothing, or wider than the sheet', () => {
    for (const tracingAccuracyPx of [0, 1e6]) {
      const document = changed(drawn(pile), 'netCount', (count) => ({ ...count, tracingAccuracyPx }));
      expect(netCheckReading.parse(checkOfDocument(document)).faults).toEqual([]);
    }
  });
});
