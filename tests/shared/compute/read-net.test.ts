import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type NetReading, netReading } from '#shared/contract/reading.ts';
import { arbitraryDocument } from '#tests/support/arbitrary-document.ts';
import { changed, withAdded, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import type { RandomReading } from '#tests/support/exact-nets/random-readings.ts';

const [parabola, apron, pile] = EXACT_NETS as [
  (typeof EXACT_NETS)[number],
  (typeof EXACT_NETS)[number],
  (typeof EXACT_NETS)[number],
];
const inParabola = parabola.net.placeAt(3.4, 1.5);

function parabolaNet(readings = [{ at: inParabola, clicked: true }]): FlowNetDocument {
  return exactNetDocument(parabola.net, { pxPerUnit: parabola.pxPerUnit, readings });
}

function codesOf(reading: NetReading): string[] {
  return reading.findings.map((found) => found.code);
}

/** The net is unfinished for this reason, and no point has a figure. */
function expectWithheld(document: FlowNetDocument, code: string): NetReading {
  const reading = readNet(document);
  expect(codesOf(reading)).toContain(code);
  expect(reading.state).toBe('unfinished');
  for (const point of reading.points) {
    expect(point.status).toBe('withheld');
    expect([point.totalHead, point.pressureHead, point.porePressure, point.dropsLost]).toEqual([
      null,
      null,
      null,
      null,
    ]);
  }
  return reading;
}

describe('a document of any kind', () => {
  it('is answered without an exception, and the answer keeps to its schema', () => {
    fc.assert(
      fc.property(arbitraryDocument(), (document) => {
        netReading.parse(readNet(document));
      }),
      { numRuns: 500 },
    );
  });
});

describe('a net that is not finished gives no figure and says why', () => {
  it('without known points', () => {
    const reading = expectWithheld(
      changed(parabolaNet(), 'knownPoint', () => null),
      'setOutIncomplete',
    );
    expect(reading.points[0]?.reason?.text).toMatch(/^Net unfinished\. Mark two known points/);
  });

  it('without a headwater boundary, without an outlet, without a level', () => {
    expectWithheld(
      withLines(parabolaNet(), 'submergedFace', () => null),
      'headwaterBoundaryMissing',
    );
    expectWithheld(
      withLines(parabolaNet(), 'drain', () => null),
      'outletMissing',
    );
    expectWithheld(
      changed(parabolaNet(), 'waterLevels', (value) => ({ ...value, headwater: null })),
      'headwaterMissing',
    );
    const levelless = changed(parabolaNet(), 'waterLevels', (value) => ({ ...value, headwater: null }));
    expect(codesOf(readNet(levelless)).filter((code) => code === 'headwaterMissing')).toHaveLength(1);
    const bed = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });
    expectWithheld(
      changed(bed, 'waterLevels', (value) => ({ ...value, tailwater: null })),
      'tailwaterMissing',
    );
    expectWithheld(
      withLines(bed, 'submergedFace', (value) => ({ ...value, water: null })),
      'faceWithoutWater',
    );
  });

  it('until the drops are stated, proposing what the lines make', () => {
    const reading = expectWithheld(
      changed(parabolaNet(), 'netCount', (value) => ({ ...value, drops: null })),
      'dropsNotStated',
    );
    expect(reading.quantities.tracedDrops).toBe(10);
    expect(reading.findings.find((found) => found.code === 'dropsNotStated')?.text).toContain('make 10');
    const numbers = reading.lines.filter((line) => line.source === 'counted').map((line) => line.drops);
    expect(numbers).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
  });

  it('while the count and the traced lines disagree', () => {
    expectWithheld(
      changed(parabolaNet(), 'netCount', (value) => ({ ...value, drops: 11 })),
      'countDisagrees',
    );
    expectWithheld(
      withLines(parabolaNet(), 'equipotential', (value, i) => (i === 4 ? null : value)),
      'countDisagrees',
    );
  });

  it('while a line is unfinished it is left out, so that the count does not stand', () => {
    const reading = readNet(
      withLines(parabolaNet(), 'equipotential', (value, i) => ({ ...value, finished: i !== 4 })),
    );
    expect(reading.state).toBe('unfinished');
    expect(codesOf(reading)).toContain('lineNotFinished');
  });

  it('when no head is lost', () => {
    const bed = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });
    const reversed = changed(bed, 'waterLevels', (value) => ({ ...value, headwater: 99, tailwater: 106 }));
    expect(codesOf(expectWithheld(reversed, 'noHeadLost'))).toContain('headwaterBelowTailwater');
  });
});

describe('lines that contradict one another are told with their place', () => {
  it('an equipotential traced twice', () => {
    const document = parabolaNet();
    const twice = Object.values(document.entities).find(
      (entity) => entity.value.kind === 'line' && entity.value.line === 'equipotential',
    )!;
    const reading = expectWithheld(withAdded(document, twice.value), 'tracedTwice');
    const found = reading.findings.find((each) => each.code === 'tracedTwice')!;
    expect(found.entityIds).toContain(twice.id);
    expect(found.at).not.toBeNull();
  });

  it('equipotentials that cross', () => {
    // The middle of line 5 is bent over line 6.
    const bent = withLines(parabolaNet(), 'equipotential', (value, i) => {
      if (i !== 4) return value;
      const last = value.points.length - 1;
      const points = value.points.map(([x, y], k): [number, number] => [
        x + 500 * Math.sin((Math.PI * k) / last),
        y,
      ]);
      return { ...value, points };
    });
    expectWithheld(bent, 'equipotentialsCross');
  });

  it('a typed value out of its place', () => {
    const document = withLines(parabolaNet(), 'equipotential', (value, i) =>
      i === 3 ? { ...value, drops: 4 } : i === 4 ? { ...value, drops: 3.5 } : value,
    );
    expectWithheld(document, 'typedOutOfOrder');
  });
});

describe('typed values', () => {
  it('stand for lines that are not traced', () => {
    const typed = [null, null, null, 4, null, 6];
    const sparse = withLines(parabolaNet(), 'equipotential', (value, i) =>
      i === 4 ? null : { ...value, drops: typed[i] ?? null },
    );
    const reading = readNet(sparse);
    expect(reading.state).toBe('read');
    expect(reading.quantities.unequalIntervals).toBe(true);
    expect(reading.quantities.headPerDrop).toBeNull();
    expect(reading.quantities.seepage).toBeNull();
  });

  it('give heads that are printed beside the lines', () => {
    const printed = withLines(parabolaNet(), 'equipotential', (value, i) => ({
      ...value,
      head: 116 - 2 * i,
    }));
    const reading = readNet(printed);
    expect(reading.state).toBe('read');
    expect(reading.quantities.headPerDrop).toBeCloseTo(2, 9);
    expect(reading.lines.filter((line) => line.source === 'typedHead')).toHaveLength(9);
  });

  it('part the head unequally without a head per drop', () => {
    const printed = withLines(parabolaNet(), 'equipotential', (value, i) => ({
      ...value,
      head: i === 4 ? 107.3 : 116 - 2 * i,
    }));
    const reading = readNet(printed);
    expect(reading.state).toBe('read');
    expect(reading.quantities.unequalIntervals).toBe(true);
    expect(reading.quantities.headPerDrop).toBeNull();
    expect(reading.lines.map((line) => line.head)).toContain(107.3);
  });

  it('unequal as they are, still need as many lines as the count says', () => {
    const bed = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });
    const typed = withLines(bed, 'equipotential', (value, i) => ({ ...value, head: 105.9 - 0.47 * i }));
    const stating = (drops: number) => readNet(changed(typed, 'netCount', (value) => ({ ...value, drops })));
    expect(stating(12).state).toBe('read');
    expect(codesOf(stating(20))).toContain('countDisagrees');
    expect(stating(20).state).toBe('unfinished');
  });

  it('allow a part drop at the outlet', () => {
    const reading = readNet(changed(parabolaNet(), 'netCount', (value) => ({ ...value, drops: 9.5 })));
    expect(reading.state).toBe('read');
    expect(reading.quantities.drops).toBe(9.5);
    expect(reading.quantities.headPerDrop).toBeCloseTo(20 / 9.5, 9);
  });
});

describe('the headwater', () => {
  it('edited away from the traced waterline withholds every reading for that reason', () => {
    const reading = expectWithheld(
      changed(parabolaNet(), 'waterLevels', (value) => ({ ...value, headwater: 117 })),
      'headwaterMoved',
    );
    expect(reading.points[0]?.reason?.code).toBe('headwaterMoved');
    expect(reading.points[0]?.reason?.text).toMatch(
      /elevation 118\.00 m LD, but the headwater is 117\.00 m LD\./,
    );
  });

  it('may stand at any height over a confined bed', () => {
    const bed = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });
    const raised = readNet(changed(bed, 'waterLevels', (value) => ({ ...value, headwater: 109 })));
    expect(raised.state).toBe('read');
    expect(raised.quantities.headPerDrop).toBeCloseTo(9 / 12, 9);
  });

  it('below the top of a face without a phreatic line is questioned', () => {
    const steps = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });
    // The bed's far end is bent up into a bank that reaches above the headwater.
    const bank = withLines(steps, 'submergedFace', (value, i) => {
      const [x, y] = value.points.at(-1)!;
      return i === 0 ? { ...value, points: [...value.points, [x - 100, y - 800]] } : value;
    });
    const reading = readNet(bank);
    const found = reading.findings.find((each) => each.code === 'faceSticksOut');
    expect(found?.text).toMatch(
      /up to elevation \d+\.\d\d m LD and is cut off at the headwater, 106\.00 m LD\./,
    );
    expect(reading.state).toBe('read');
  });

  it('clips a face that sticks out of the water', () => {
    // The face is traced on to a crest 6 m above the waterline.
    const document = withLines(parabolaNet(), 'submergedFace', (value) => {
      const [x, y] = value.points[0]!;
      return { ...value, points: [[x + 300, y - 660], ...value.points] };
    });
    const reading = readNet(document);
    expect(reading.state).toBe('read');
    expect(reading.points[0]!.dropsLost).toBeCloseTo(readNet(parabolaNet()).points[0]!.dropsLost!, 3);
  });
});

describe('a point', () => {
  it('is explained in words', () => {
    const point = readNet(parabolaNet()).points[0]!;
    expect(point.explanation).toMatch(
      /^3 drops lost at line 3, then 0\.\d\d of the drop from line 3 to line 4: 3\.\d\d drops lost, total head 111\.\d\d m LD\. By the field between the two lines, which is the figure: 3\.\d\d drops lost, total head 111\.\d\d m LD\.$/,
    );
    expect(point.between?.fraction).toBeGreaterThan(0);
    expect(point.totalHeadPlusMinus).toBeGreaterThan(0);
  });

  it('above the phreatic line has pressure 0 and no head', () => {
    const [offset, elevation] = parabola.net.placeAt(4, 0);
    const point = readNet(parabolaNet([{ at: [offset, elevation + 2], clicked: false }])).points[0]!;
    expect(point.status).toBe('abovePhreatic');
    expect(point.reason?.text).toBe('above the phreatic line, suction left out');
    expect([point.totalHead, point.pressureHead, point.porePressure]).toEqual([null, null, 0]);
  });

  it('on the phreatic line has no pressure to speak of', () => {
    const point = readNet(parabolaNet([{ at: parabola.net.placeAt(4.5, 0), clicked: true }])).points[0]!;
    expect(point.status).toBe('read');
    expect(Math.abs(point.pressureHead!)).toBeLessThan(0.1);
  });

  it('outside the net has no figure', () => {
    const points = readNet(
      parabolaNet([
        { at: [0, 90], clicked: false },
        { at: [-80, 100], clicked: false },
        { at: [30, 99], clicked: true },
      ]),
    ).points;
    expect(points.map((point) => point.reason?.code)).toEqual(['outsideNet', 'outsideNet', 'outsideNet']);
  });

  it('typed 100 m off the section is questioned', () => {
    const points = readNet(
      parabolaNet([
        { at: [-400, 100], clicked: false },
        { at: inParabola, clicked: false },
      ]),
    ).points;
    expect(points.map((point) => point.findings.map((found) => found.code))).toEqual([['pointFarOff'], []]);
  });

  it('near an end at which no boundary is traced is flagged', () => {
    const { net, pxPerUnit } = apron;
    const readings = [
      { at: net.placeAt(5.5, 6.8), clicked: true },
      { at: net.placeAt(5.5, 1), clicked: true },
    ];
    const open = withLines(exactNetDocument(net, { pxPerUnit, readings }), 'flowLine', () => null);
    const { points } = readNet(open);
    expect(points.map((point) => point.findings.map((found) => found.code))).toEqual([['nearOpenEnd'], []]);
  });

  it('on a thin wall is questioned, as either side could be meant', () => {
    const { net, pxPerUnit } = pile;
    const readings: RandomReading[] = [-0.5, 0, 0.5].map((offset) => ({ at: [offset, 95], clicked: true }));
    const { points } = readNet(exactNetDocument(net, { pxPerUnit, readings }));
    const codes = points.map((point) => point.findings.map((found) => found.code));
    expect(codes).toEqual([[], ['onThinWall'], []]);
  });

  it('beside a wall is read on its own side', () => {
    const { net, pxPerUnit } = pile;
    const readings: RandomReading[] = [
      { at: [-0.15, 96], clicked: true },
      { at: [0.15, 96], clicked: true },
    ];
    const { points } = readNet(exactNetDocument(net, { pxPerUnit, readings, jitterPx: 1.5 }));
    const drop = 0.4;
    points.forEach((point, i) => {
      const exact = net.headAt(...readings[i]!.at);
      expect(Math.abs(point.totalHead! - exact) / drop).toBeLessThan(0.1);
    });
  });
});

describe('inputs that would make every figure wrong give none', () => {
  it('a unit weight of water of the other unit system', () => {
    const reading = readNet(changed(parabolaNet(), 'waterLevels', (value) => ({ ...value, gammaW: 62.4 })));
    expect(codesOf(reading)).toContain('unitWeightImplausible');
    expect(reading.state).toBe('unfinished');
    expect(reading.points.every(({ porePressure }) => porePressure === null)).toBe(true);
  });

  it('an upstream side that the headwater boundary denies, mirrored or not', () => {
    for (const mirrored of [false, true]) {
      const bed = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit, mirrored, turnDeg: 8 });
      const saying = (upstream: 'left' | 'right') =>
        readNet(changed(bed, 'setOut', (value) => ({ ...value, upstream })));
      expect(saying(mirrored ? 'right' : 'left').state).toBe('read');
      const denied = saying(mirrored ? 'left' : 'right');
      expect(codesOf(denied)).toContain('upstreamDisagrees');
      expect(denied.state).toBe('unfinished');
    }
  });

  it('two waters marked on one another’s boundaries', () => {
    const bed = exactNetDocument(apron.net, {
      pxPerUnit: apron.pxPerUnit,
      readings: [{ at: [0, 90], clicked: true }],
    });
    const swapped = withLines(bed, 'submergedFace', (value) => ({
      ...value,
      water: value.water === 'headwater' ? ('tailwater' as const) : ('headwater' as const),
    }));
    expect(readNet(bed).points[0]!.totalHead).not.toBeNull();
    expect(readNet(swapped).points[0]!.totalHead).toBeNull();
  });
});

describe('implausible inputs are questioned but not refused', () => {
  it('a permeability that no soil has', () => {
    const reading = readNet(
      changed(parabolaNet(), 'permeability', (value) => ({ ...value, k: 20, unit: 'm/s' as const })),
    );
    expect(codesOf(reading)).toContain('permeabilityImplausible');
    expect(reading.state).toBe('read');
  });

  it('a ratio of the cells that no drawn net has', () => {
    const codesAt = (cellRatio: number) =>
      codesOf(readNet(changed(parabolaNet(), 'netCount', (value) => ({ ...value, cellRatio }))));
    expect(codesAt(0.19)).toContain('cellRatioImplausible');
    expect(codesAt(5.1)).toContain('cellRatioImplausible');
    for (const plausible of [0.2, 1, 5]) expect(codesAt(plausible)).not.toContain('cellRatioImplausible');
  });

  it('a unit weight of water that few waters have', () => {
    const reading = readNet(changed(parabolaNet(), 'waterLevels', (value) => ({ ...value, gammaW: 9.5 })));
    expect(codesOf(reading)).toContain('unitWeightImplausible');
    expect(reading.state).toBe('read');
    expect(codesOf(readNet(parabolaNet()))).not.toContain('unitWeightImplausible');
  });

  it('a headwater with a digit too many', () => {
    const bed = exactNetDocument(apron.net, { pxPerUnit: apron.pxPerUnit });
    const reading = readNet(changed(bed, 'waterLevels', (value) => ({ ...value, headwater: 1060 })));
    expect(codesOf(reading)).toContain('headwaterFarAbove');
    expect(codesOf(readNet(bed))).not.toContain('headwaterFarAbove');
  });

  it('a count that the phreatic line denies, as after a line left out and the rest counted anew', () => {
    const short = withLines(parabolaNet(), 'equipotential', (value, i) => (i === 4 ? null : value));
    const reading = readNet(changed(short, 'netCount', (value) => ({ ...value, drops: 9 })));
    expect(reading.state).toBe('read');
    const found = reading.findings.find((each) => each.code === 'phreaticHeadDiffers');
    expect(found?.text).toMatch(/its head is \d+\.\d\d m LD, but the elevation there is \d+\.\d\d m LD;/);
    expect(codesOf(readNet(parabolaNet()))).not.toContain('phreaticHeadDiffers');
  });

  it('channels stated beside no flow line are of the whole flow, not traced channels only', () => {
    const bare = withLines(parabolaNet(), 'flowLine', () => null);
    const { quantities } = readNet(changed(bare, 'netCount', (value) => ({ ...value, channels: 3 })));
    expect(quantities).toMatchObject({ channels: 3, channelsComplete: true });
    expect(readNet(bare).quantities).toMatchObject({ channels: null, channelsComplete: false });
  });

  it('channels stated otherwise than traced', () => {
    const reading = readNet(changed(parabolaNet(), 'netCount', (value) => ({ ...value, channels: 5 })));
    expect(codesOf(reading)).toContain('channelsDiffer');
    expect(reading.quantities.channels).toBe(5);
  });
});
