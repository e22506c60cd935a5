import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { similarityBackward } from '#shared/compute/similarity.ts';
import { type EntityOf, type FlowNetDocument, type SheetPoint, UNSAID } from '#shared/contract/document.ts';
import { type NetReading, netReading } from '#shared/contract/reading.ts';
import { changed, withAdded, withLines } from '#tests/support/exact-nets/edit-net.ts';
import {
  entityIdOf,
  exactNetDocument,
  sheetMapOf,
  type Tracing,
} from '#tests/support/exact-nets/exact-net-document.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';
import { seriesStripNet } from '#tests/support/exact-nets/series-strip-net.ts';

const codesOf = (reading: NetReading) => reading.findings.map(({ code }) => code);
const wordsOf = (reading: NetReading) => reading.findings.map(({ text }) => text).join(' ');

function worstInDrops(reading: NetReading, exact: (offset: number, elevation: number) => number): number {
  expect(reading.state, wordsOf(reading)).toBe('read');
  const drop = reading.quantities.headPerDrop!;
  const errors = reading.points.map(
    ({ byField, offset, elevation }) =>
      Math.abs((byField?.totalHead ?? Number.NaN) - exact(offset!, elevation!)) / drop,
  );
  expect(errors.length).toBeGreaterThan(0);
  return Math.max(...errors);
}

describe('a zoned strip in series (Darcy 1856)', () => {
  const strip = {
    lengths: [40, 20],
    permeabilities: [4e-6, 1e-6],
    thickness: 10,
    headwater: 110,
    tailwater: 104,
    drops: 5,
    top: 100,
  } as const;
  const net = seriesStripNet(strip);
  // Beside the boundary at 40 and in the drop that passes it, from 24 to 42.
  const readings = [3, 12, 25, 30, 36, 39.5, 40.5, 41.5, 45, 52, 58].map((offset, i) => ({
    at: [offset, 91 + (i % 4) * 2.3] as const,
    clicked: i % 2 === 0,
  }));
  const second = (k: number, place: readonly [number, number], tracing: Tracing): EntityOf<'soil'> => ({
    kind: 'soil',
    ...UNSAID.soil,
    name: 'the core',
    places: [similarityBackward(sheetMapOf(net, tracing), ...place)],
    k,
    unit: 'm/s',
    factor: null,
    source: '',
  });
  function zoned(tracing: Tracing, soil: Partial<EntityOf<'soil'>> = {}): FlowNetDocument {
    const drawn = exactNetDocument(net, tracing);
    const first = changed(drawn, 'permeability', (value) => ({ ...value, k: 4e-6 }));
    const counted = changed(first, 'netCount', (value) => ({ ...value, channels: 1, cellRatio: 10 / 24 }));
    return withAdded(counted, { ...second(1e-6, [50, 95], tracing), ...soil });
  }

  it.each([{ turnDeg: 1.1 }, { turnDeg: -2, mirrored: true }, { turnDeg: 1.1, jitterPx: 1.5 }] as Tracing[])(
    'is read in straight lines of head, steeper in the tighter soil (%o)',
    (lie) => {
      const reading = readNet(zoned({ pxPerUnit: 60, readings, ...lie }));
      expect(worstInDrops(reading, net.headAt)).toBeLessThan(lie.jitterPx ? 0.02 : 0.003);
      expect(codesOf(reading)).not.toContain('severalSoils');
      expect(codesOf(reading)).not.toContain('refractionOff');
      // q = H·T/(l₁/k₁ + l₂/k₂).
      expect(reading.quantities.seepage! / ((6 * 10) / 3e7)).toBeCloseTo(1, 6);
      expect(reading.soils!.expectedRatios.map(({ cellRatio }) => cellRatio)).toEqual([
        expect.closeTo(10 / 24, 9),
        expect.closeTo(10 / 6, 9),
      ]);
      expect(reading.frame!.kind).toBe('natural');
    },
  );

  it('would be read wrongly without its soils, which is questioned', () => {
    const reading = readNet(exactNetDocument(net, { pxPerUnit: 60, readings }));
    expect(codesOf(reading)).toContain('severalSoils');
    expect(worstInDrops(reading, net.headAt)).toBeGreaterThan(0.1);
  });

  it('counts q in the soil that is named', () => {
    const tracing = { pxPerUnit: 60, readings };
    const named = changed(zoned(tracing), 'netCount', (value) => ({
      ...value,
      countedIn: entityIdOf(0x10000 + Object.keys(exactNetDocument(net, tracing).entities).length),
      cellRatio: 10 / 6,
    }));
    const reading = readNet(named);
    expect(reading.quantities.seepage! / ((6 * 10) / 3e7)).toBeCloseTo(1, 6);
    const gone = changed(named, 'netCount', (value) => ({ ...value, countedIn: entityIdOf(0xdead) }));
    expect(codesOf(readNet(gone))).toContain('countedSoilUnknown');
    expect(readNet(gone).quantities.seepage).toBeNull();
  });

  it.each([false, true])(
    'is asked about an equipotential left out, by a spacing that knows the soils, and about none of a whole net (flow line: %s)',
    (hasFlowLine) => {
      const tracing = { pxPerUnit: 60, readings };
      const at = (offset: number): SheetPoint => {
        const [x, y] = similarityBackward(sheetMapOf(net, tracing), offset, 95);
        return [x, y];
      };
      const base = zoned(tracing);
      const line = Object.values(base.entities).flatMap(({ value }) =>
        value.kind === 'line' && value.line === 'equipotential' ? [value] : [],
      )[0]!;
      const points = Array.from({ length: 61 }, (_, i) => at(i));
      const withFlow = changed(
        withAdded(base, { ...line, line: 'flowLine', points }),
        'netCount',
        (value) => ({ ...value, channels: 2, cellRatio: 5 / 24 }),
      );
      const whole = hasFlowLine ? withFlow : base;
      expect(codesOf(readNet(whole))).not.toContain('lineMissing');
      const without = withLines(whole, 'equipotential', (value, i) => (i === 1 ? null : value));
      const reading = readNet(changed(without, 'netCount', (value) => ({ ...value, drops: 4 })));
      expect(codesOf(reading)).toContain('lineMissing');
      expect(
        reading.points.every(({ findings }) => findings.some(({ code }) => code.startsWith('lineMissing'))),
      ).toBe(true);
    },
  );

  it('gives no figure while a soil has no permeability', () => {
    const reading = readNet(zoned({ pxPerUnit: 60, readings }, { k: null }));
    expect(codesOf(reading)).toContain('soilPermeabilityMissing');
    expect(reading.state).toBe('unfinished');
  });

  it('says that soils of differing kh/kv have no common transformed section, and reads them all the same', () => {
    // Level flow knows nothing of kv.
    const reading = readNet(zoned({ pxPerUnit: 60, readings }, { kv: 2e-7 }));
    expect(codesOf(reading)).toContain('noCommonTransform');
    expect(reading.frame!.kind).toBe('none');
    expect(worstInDrops(reading, net.headAt)).toBeLessThan(0.003);
  });
});

describe('a thin wall of tight soil within one drop (Darcy 1856)', () => {
  // A slurry wall of 0.6 m in 60 m of sand a hundred times as permeable: it takes half of the head.
  const [from, to, end] = [30, 30.6, 60];
  const resistance = (offset: number) => offset + 99 * Math.max(0, Math.min(offset, to) - from);
  const headAt = (offset: number) => 110 - (6 * resistance(offset)) / resistance(end);
  const net = seriesStripNet({
    lengths: [from, end - from],
    permeabilities: [4e-6, 4e-6],
    thickness: 10,
    headwater: 110,
    tailwater: 104,
    drops: 1,
    top: 100,
  });
  const tracing: Tracing = {
    pxPerUnit: 60,
    readings: [5, 20, 29, 32, 45, 58].map((offset) => ({ at: [offset, 93] as const, clicked: true })),
  };
  const onSheet = (offset: number, elevation: number): SheetPoint => {
    const [x, y] = similarityBackward(sheetMapOf(net, tracing), offset, elevation);
    return [x, y];
  };
  const sand = changed(exactNetDocument(net, tracing), 'permeability', (value) => ({ ...value, k: 4e-6 }));
  const otherSide = Object.values(sand.entities).flatMap(({ value }) =>
    value.kind === 'line' && value.line === 'soilBoundary'
      ? [{ ...value, points: [onSheet(to, 100), onSheet(to, 90)] }]
      : [],
  )[0]!;
  const wall: EntityOf<'soil'> = {
    kind: 'soil',
    ...UNSAID.soil,
    name: 'the slurry wall',
    places: [onSheet((from + to) / 2, 95)],
    k: 4e-8,
    unit: 'm/s',
    factor: null,
    source: '',
  };

  it('parts the head as its resistance does', () => {
    const reading = readNet(withAdded(withAdded(sand, otherSide), wall));
    expect(codesOf(reading)).not.toContain('soilOutsideNet');
    expect(worstInDrops(reading, headAt)).toBeLessThan(0.005);
  });
});

describe('whatever soils are typed', () => {
  const net = flatApronNet({
    width: 20,
    headwater: 106,
    tailwater: 100,
    drops: 6,
    channels: 3,
    middle: [0, 98],
  });
  const plain = exactNetDocument(net, { pxPerUnit: 60, readings: randomReadings(net, 3, 2, 0.1) });
  const k = fc.option(
    fc.oneof(fc.double({ min: 1e-9, max: 1e-2, noNaN: true }), fc.constantFrom(5e-324, 1e3)),
  );
  const soil = fc.record({
    k,
    kv: k,
    dipDeg: fc.double({ min: -90, max: 90, noNaN: true }),
    places: fc.array(
      fc.tuple(fc.double({ min: 0, max: 5000, noNaN: true }), fc.double({ min: 0, max: 3500, noNaN: true })),
      { maxLength: 3 },
    ),
  });
  const place = fc.tuple(fc.integer({ min: 500, max: 4500 }), fc.integer({ min: 500, max: 3200 }));

  it('the reading is answered and keeps to its schema', () => {
    fc.assert(
      fc.property(
        soil,
        fc.array(soil, { maxLength: 2 }),
        fc.array(fc.array(place, { minLength: 2, maxLength: 4 }), { maxLength: 3 }),
        fc.constantFrom('equal' as const, 'plottingExaggeration' as const, 'transformedSection' as const),
        (section, placed, boundaries, scales) => {
          const { k: kh, kv, dipDeg } = section;
          const typed = changed(plain, 'permeability', (value) => ({ ...value, k: kh, kv, dipDeg }));
          const scaled = changed(typed, 'setOut', (value) => ({ ...value, scales }));
          const document = withAdded(
            scaled,
            ...boundaries.map(
              (points): EntityOf<'line'> => ({
                kind: 'line',
                origin: 'traced',
                line: 'soilBoundary',
                name: '',
                points,
                finished: true,
                water: null,
                head: null,
                drops: null,
              }),
            ),
            ...placed.map(
              (each, i): EntityOf<'soil'> => ({
                kind: 'soil',
                ...UNSAID.soil,
                name: `soil ${i}`,
                unit: 'm/s',
                factor: null,
                source: '',
                ...each,
              }),
            ),
          );
          const reading = netReading.parse(readNet(document));
          expect(reading.frame).not.toBeNull();
          expect(reading.soils).not.toBeNull();
        },
      ),
      { numRuns: 30 },
    );
  });
});

describe('an apron drawn as a transformed section (Pavlovsky 1922, Harr 1962)', () => {
  // kh/kv = 9: the floor of 24 m is drawn 8 m wide.
  const stretch = 3;
  const net = flatApronNet({
    width: 8,
    headwater: 106,
    tailwater: 100,
    drops: 12,
    channels: 7,
    middle: [0, 98],
  });
  const natural = (offset: number, elevation: number) => net.headAt(offset / stretch, elevation);
  const readings = randomReadings(net, 12, 5, 0.1);
  function drawn(tracing: Tracing, setOut: Partial<EntityOf<'setOut'>> = {}): FlowNetDocument {
    const plain = exactNetDocument(net, { pxPerUnit: 130, readings, ...tracing });
    const known = changed(plain, 'knownPoint', (value) => ({ ...value, offset: value.offset! * stretch }));
    const placed = changed(known, 'readingPoint', ({ place, ...value }) => ({
      ...value,
      place: place.on === 'sheet' ? place : { ...place, offset: place.offset * stretch },
    }));
    const soil = changed(placed, 'permeability', (value) => ({ ...value, k: 9e-6 }));
    return changed(soil, 'setOut', (value) => ({ ...value, scales: 'transformedSection', ...setOut }));
  }

  it.each([{}, { mirrored: true, turnDeg: -1.7 }] as Tracing[])('is not transformed again (%o)', (lie) => {
    const reading = readNet(drawn(lie));
    expect(worstInDrops(reading, natural)).toBeLessThan(0.02);
    expect(reading.frame!.kind).toBe('transformed');
    expect(reading.frame!.ratio).toBeCloseTo(9, 6);
    expect(reading.frame!.matrix).toEqual([1, 0, 0, 1]);
    expect(reading.setOut.exaggeration).toBeCloseTo(3, 6);
    expect(codesOf(reading)).toContain('impliedAnisotropy');
  });

  it('seeps with √(kh·kv) and has its gradients in the natural section', () => {
    const reading = readNet(drawn({}));
    expect(reading.quantities.seepage! / (3e-6 * 6 * (7 / 12))).toBeCloseTo(1, 6);
    const step = 1e-4;
    const errors = reading.points.map(({ byField, offset, elevation }) => {
      const [x, z] = [offset!, elevation!];
      const across = (natural(x + step, z) - natural(x - step, z)) / (2 * step);
      const up = (natural(x, z + step) - natural(x, z - step)) / (2 * step);
      const [gx, gz] = byField!.gradient;
      return Math.hypot(gx - across, gz - up) / Math.hypot(across, up);
    });
    expect(errors.sort((a, b) => a - b)[errors.length >> 1]).toBeLessThan(0.05);
    expect(Math.max(...errors)).toBeLessThan(0.25);
  });

  it('is contradicted by other permeabilities, and by a dip', () => {
    const typed = (soil: Partial<EntityOf<'permeability'>>) =>
      readNet(changed(drawn({}), 'permeability', (value) => ({ ...value, ...soil })));
    expect(typed({ kv: 1.05e-6 }).state).toBe('read');
    expect(codesOf(typed({ kv: 2e-6 }))).toContain('anisotropyContradicts');
    expect(typed({ kv: 2e-6 }).state).toBe('unfinished');
    expect(codesOf(typed({ dipDeg: 5 }))).toContain('dipInTransformed');
  });

  it('taken for exaggerated and isotropic, is another net', () => {
    const reading = readNet(drawn({}, { scales: 'plottingExaggeration' }));
    expect(reading.frame!.kind).toBe('natural');
    // The cells are then oblongs, and what the field makes of the points between them differs.
    expect(reading.quantities.seepage! / (9e-6 * 6 * (7 / 12))).toBeCloseTo(1, 6);
  });

  it('taken for one of one scale, gives no figure', () => {
    const reading = readNet(drawn({}, { scales: 'equal' }));
    expect(codesOf(reading)).toContain('scalesUnequal');
    expect(reading.state).toBe('unfinished');
  });
});
