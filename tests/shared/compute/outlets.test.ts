import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import { changed, withAdded, withLines } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { freeOutflowNet } from '#tests/support/exact-nets/free-outflow-net.ts';

const [parabola, apron, pile] = EXACT_NETS as [
  (typeof EXACT_NETS)[number],
  (typeof EXACT_NETS)[number],
  (typeof EXACT_NETS)[number],
];

describe('a face of free outflow', () => {
  it('is the outlet, its lowest elevation the head at which the water has left', () => {
    const reading = readNet(freeOutflowNet([{ at: [5, 3] }]));
    // What is asked about in a sketch, its angles and its exit, withholds nothing.
    expect(reading.findings.filter(({ weight }) => weight === 'wrong' || weight === 'missing')).toEqual([]);
    expect(reading.state).toBe('read');
    expect(reading.quantities.headLost).toBeCloseTo(10, 2);
    expect(reading.lines.filter((line) => line.source === 'boundary').map((line) => line.head)).toEqual([
      10,
      null,
    ]);
  });

  it('has h = z along it', () => {
    const { points } = readNet(freeOutflowNet([{ at: [10, 3] }, { at: [10, 1.4] }, { at: [9.99, 0.4] }]));
    expect(points.map((point) => point.status)).toEqual(['read', 'read', 'read']);
    for (const point of points) expect(Math.abs(point.pressureHead!)).toBeLessThan(0.02);
  });

  it('keeps heads between the headwater and its own elevations, falling along the flow', () => {
    const places = [0.5, 2, 4, 6, 8, 9, 9.7].map((x) => ({ at: [x, 0.2] as const }));
    const heads = readNet(freeOutflowNet(places)).points.map((point) => point.totalHead!);
    heads.forEach((head, i) => {
      expect(head).toBeLessThan(i === 0 ? 10 : heads[i - 1]!);
      expect(head).toBeGreaterThan(0);
    });
  });

  it('that is level takes its ground elevation, never a lower tailwater', () => {
    const net = exactNetDocument(pile.net, { pxPerUnit: pile.pxPerUnit });
    const dry = withLines(net, 'submergedFace', (value, i) =>
      i === 1 ? { ...value, line: 'outflowFace', water: null } : value,
    );
    // Ground at 99, headwater at 104, a tailwater level of 90 entered for nothing.
    const reading = readNet(changed(dry, 'waterLevels', (value) => ({ ...value, tailwater: 90 })));
    expect(reading.state).toBe('read');
    expect(reading.quantities.headLost).toBeCloseTo(5, 6);
  });
});

describe('a core whose shells drain freely', () => {
  const line = {
    kind: 'line',
    origin: 'traced',
    name: '',
    finished: true,
    water: null,
    head: null,
    drops: null,
  } as const;
  // Offsets 0 to 10 are the core; its shells stand before and behind it under the ground line of the dam.
  const toSheet = ([x, z]: readonly [number, number]): [number, number] => [500 + 100 * x, 2000 - 100 * z];
  const shells = withAdded(freeOutflowNet([{ at: [5, 3] }, { at: [10, 1.4] }, { at: [14, 2] }]), {
    ...line,
    line: 'ground',
    points: (
      [
        [-15, 0],
        [-1, 11],
        [11, 11],
        [25, 0],
      ] as const
    ).map(toSheet),
  });

  it('is read to its own face, which is the boundary', () => {
    const [core, face] = readNet(shells).points;
    const [bare, bareFace] = readNet(freeOutflowNet([{ at: [5, 3] }, { at: [10, 1.4] }])).points;
    expect(core!.totalHead).toBeCloseTo(bare!.totalHead!, 9);
    expect(face!.totalHead).toBeCloseTo(bareFace!.totalHead!, 9);
  });

  it('has no head in the shell behind it', () => {
    const shell = readNet(shells).points[2]!;
    expect(shell.status).toBe('withheld');
    expect(shell.totalHead).toBeNull();
  });
});

describe('a drain', () => {
  it('under pressure carries its head', () => {
    const net = exactNetDocument(parabola.net, { pxPerUnit: parabola.pxPerUnit });
    const held = readNet(withLines(net, 'drain', (value) => ({ ...value, head: 103 })));
    expect(held.quantities.headLost).toBeCloseTo(15, 9);
    expect(held.state).toBe('read');
  });

  it('with a head below itself, as a depth typed for an elevation is, has no figure', () => {
    const net = exactNetDocument(parabola.net, {
      pxPerUnit: parabola.pxPerUnit,
      readings: [{ at: parabola.net.placeAt(1.5, 1.2), clicked: true }],
    });
    const reading = readNet(withLines(net, 'drain', (value) => ({ ...value, head: 3 })));
    expect(reading.findings.map((found) => found.code)).toContain('drainHeadBelowDrain');
    expect(reading.points[0]!.porePressure).toBeNull();
  });

  it('above the headwater is questioned', () => {
    const net = exactNetDocument(parabola.net, { pxPerUnit: parabola.pxPerUnit });
    const codes = readNet(withLines(net, 'drain', (value) => ({ ...value, head: 130 }))).findings.map(
      (found) => found.code,
    );
    expect(codes).toContain('outletAboveHeadwater');
  });
});

describe('a drain that the flow does not reach', () => {
  it('withholds the figures of a net that was drawn without it', () => {
    const net = exactNetDocument(apron.net, {
      pxPerUnit: apron.pxPerUnit,
      readings: [
        { at: [0, 95], clicked: true },
        { at: [0, 98], clicked: true },
      ],
    });
    expect(readNet(net).state).toBe('read');
    const places = entitiesOf(net, 'readingPoint').map(({ value }) =>
      value.place.on === 'sheet' ? value.place.at : null,
    );
    const well = { kind: 'line', origin: 'traced', line: 'drain', name: 'Well 3', finished: true } as const;
    const points = places.filter((place) => place !== null);
    const reading = readNet(withAdded(net, { ...well, points, water: null, head: null, drops: null }));
    expect(reading.findings.find((found) => found.weight === 'wrong')).toMatchObject({
      code: 'outletLeftOut',
      text: expect.stringContaining('Well 3'),
    });
    expect(reading.points.map((point) => point.porePressure)).toEqual([null, null]);
  });
});

describe('boundaries in pieces', () => {
  const net = exactNetDocument(pile.net, {
    pxPerUnit: pile.pxPerUnit,
    readings: [{ at: pile.net.placeAt(0.5, 2.2), clicked: true }],
  });
  const bed = Object.values(net.entities).find(
    ({ value }) => value.kind === 'line' && value.water === 'headwater',
  )!;

  it('are one boundary when they carry one head', () => {
    if (bed.value.kind !== 'line') throw new Error('the bed is a line');
    const { points } = bed.value;
    const half = Math.floor(points.length / 2);
    const first = withLines(net, 'submergedFace', (value) =>
      value.water === 'headwater' ? { ...value, points: points.slice(0, half + 1) } : value,
    );
    const reading = readNet(withAdded(first, { ...bed.value, points: points.slice(half) }));
    expect(reading.points[0]!.dropsLost).toBeCloseTo(readNet(net).points[0]!.dropsLost!, 9);
    expect(reading.lines.filter((line) => line.drops === 0)).toHaveLength(2);
  });
});
