import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createNetReader } from '#shared/compute/net-reader.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { arbitraryDocument } from '#tests/support/arbitrary-document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { freeOutflowNet } from '#tests/support/exact-nets/free-outflow-net.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';

type Change = { readonly entity: number; readonly vertex: number; readonly dx: number; readonly dy: number };

/** One vertex of a line moved, a level changed, a line taken away, or a point moved. */
const change = fc.record({
  entity: fc.nat(1000),
  vertex: fc.nat(1000),
  dx: fc.double({ min: -6, max: 6, noNaN: true }),
  dy: fc.double({ min: -6, max: 6, noNaN: true }),
});

function changed(document: FlowNetDocument, { entity, vertex, dx, dy }: Change): FlowNetDocument {
  const copy = structuredClone(document);
  const all = Object.values(copy.entities);
  const { id, value } = all[entity % all.length]!;
  if (value.kind === 'line' && vertex % 10 === 0) delete copy.entities[id];
  else if (value.kind === 'line') {
    const at = vertex % value.points.length;
    const [x, y] = value.points[at]!;
    value.points[at] = [x + dx, y + dy];
  } else if (value.kind === 'waterLevels' && value.headwater !== null) value.headwater += dx / 10;
  else if (value.kind === 'netCount') value.tracingAccuracyPx = 1 + Math.abs(dx) / 4;
  else if (value.kind === 'readingPoint' && value.place.on === 'sheet') {
    value.place.at = [value.place.at[0] + dx, value.place.at[1] + dy];
  } else if (value.kind === 'knownPoint' && value.offset !== null) value.offset += dx / 1000;
  return copy;
}

describe('a reader that remembers', () => {
  it.each(EXACT_NETS)('reads what is read from scratch, change after change: $name', ({ net, pxPerUnit }) => {
    const readings = randomReadings(net, 25, 4);
    const traced = exactNetDocument(net, { pxPerUnit, readings, jitterPx: 1.5 });
    fc.assert(
      fc.property(fc.array(change, { minLength: 1, maxLength: 5 }), (changes) => {
        const reader = createNetReader();
        let document = traced;
        expect(reader.read(document)).toEqual(readNet(structuredClone(document)));
        for (const each of changes) {
          document = changed(document, each);
          expect(() => reader.readPoints(document)).not.toThrow();
          expect(reader.read(document)).toEqual(readNet(structuredClone(document)));
        }
        // Undone again, what was kept of the last change must not stand.
        expect(reader.read(structuredClone(traced))).toEqual(readNet(structuredClone(traced)));
      }),
      { numRuns: 4 },
    );
  });

  it('holds on faces along which the head is the elevation', () => {
    const reader = createNetReader();
    const net = freeOutflowNet([1, 3, 5, 7, 9, 9.995].map((x) => ({ at: [x, 0.5] as const })));
    for (const dx of [0, 0.4, -0.8, 0.4]) {
      const document = structuredClone(net);
      for (const { value } of Object.values(document.entities)) {
        if (value.kind === 'knownPoint' && value.elevation !== null) value.elevation += dx;
      }
      expect(reader.read(document)).toEqual(readNet(structuredClone(document)));
    }
  });

  it('takes no change for the line of before, made in place or not', () => {
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const document = exactNetDocument(net, {
      pxPerUnit,
      readings: randomReadings(net, 20, 4),
      jitterPx: 1.5,
    });
    const reader = createNetReader();
    reader.read(document);
    readNet(document);
    for (const { value } of Object.values(document.entities)) {
      if (value.kind !== 'line' || value.line !== 'equipotential') continue;
      for (const point of value.points) point[0] += 2;
    }
    const fresh = readNet(structuredClone(document));
    expect(readNet(document)).toEqual(fresh);
    expect(reader.read(document)).toEqual(fresh);
  });

  it('answers documents of any kind as they come', () => {
    const reader = createNetReader();
    fc.assert(
      fc.property(arbitraryDocument(), (document) => {
        expect(() => reader.readPoints(document)).not.toThrow();
        expect(reader.read(document)).toEqual(readNet(structuredClone(document)));
      }),
      { numRuns: 60 },
    );
  });
});

/** One vertex of an equipotential dragged. */
const drag = fc.record({
  line: fc.nat(1000),
  vertex: fc.nat(1000),
  dx: fc.double({ min: -9, max: 9, noNaN: true }),
  dy: fc.double({ min: -9, max: 9, noNaN: true }),
});

type Drag = typeof drag extends fc.Arbitrary<infer T> ? T : never;

function dragged(document: FlowNetDocument, { line, vertex, dx, dy }: Drag): FlowNetDocument {
  const copy = structuredClone(document);
  const lines = Object.values(copy.entities).flatMap(({ value }) =>
    value.kind === 'line' && value.line === 'equipotential' ? [value] : [],
  );
  const { points } = lines[line % lines.length]!;
  const [x, y] = points[vertex % points.length]!;
  points[vertex % points.length] = [x + dx, y + dy];
  return copy;
}

/** The whole net has its own say on a line that seems to be missing; all else is told of the point itself. */
function byThemselves(points: NetReading['points']): NetReading['points'] {
  const isOfWhole = ({ code }: { code: string }) => code.startsWith('lineMissing');
  return points.map((point) => ({ ...point, findings: point.findings.filter((found) => !isOfWhole(found)) }));
}

describe('points ahead of the whole reading', () => {
  it.each(EXACT_NETS)(
    'are those of the whole reading after a vertex is dragged: $name',
    ({ net, pxPerUnit }) => {
      const readings = randomReadings(net, 25, 7);
      const traced = exactNetDocument(net, { pxPerUnit, readings, jitterPx: 1.5 });
      const before = readNet(traced);
      const reader = createNetReader();
      reader.read(traced);
      let ahead = 0;
      fc.assert(
        fc.property(drag, (each) => {
          const document = dragged(traced, each);
          const read = reader.readPoints(document);
          const whole = readNet(structuredClone(document));
          if (read === null || whole.state !== 'read') return;
          if (JSON.stringify(whole.lines) !== JSON.stringify(before.lines)) return;
          ahead += 1;
          expect(byThemselves(read.points)).toEqual(byThemselves(whole.points));
          expect(read.measured).toEqual(whole.measured);
        }),
        { numRuns: 8 },
      );
      expect(ahead).toBeGreaterThan(3);
    },
  );

  it('follow a reading point that is moved, added or taken away', () => {
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const traced = exactNetDocument(net, { pxPerUnit, readings: randomReadings(net, 12, 7), jitterPx: 1.5 });
    const reader = createNetReader();
    reader.read(traced);
    const ids = Object.values(traced.entities).flatMap(({ id, value }) =>
      value.kind === 'readingPoint' ? [id] : [],
    );
    const without = structuredClone(traced);
    delete without.entities[ids[3]!];
    const moved = structuredClone(without);
    const point = moved.entities[ids[5]!]!.value;
    if (point.kind !== 'readingPoint' || point.place.on !== 'section') throw new Error('Readings are typed.');
    point.place.offset += 0.3;
    for (const document of [without, moved, traced]) {
      expect(reader.readPoints(document)).toMatchObject({
        points: readNet(structuredClone(document)).points,
      });
    }
  });

  it('are not given when more has changed, nor before a whole reading', () => {
    const { net, pxPerUnit } = EXACT_NETS[0]!;
    const traced = exactNetDocument(net, { pxPerUnit, readings: randomReadings(net, 5, 7), jitterPx: 1.5 });
    const reader = createNetReader();
    expect(reader.readPoints(traced)).toBeNull();
    reader.read(traced);
    const alter = (change: (value: DocumentEntity) => void) => {
      const document = structuredClone(traced);
      for (const { value } of Object.values(document.entities)) change(value);
      return reader.readPoints(document);
    };
    expect(alter(() => undefined)?.points).toEqual(readNet(traced).points);
    const headwaterUp = alter((value) => {
      if (value.kind === 'waterLevels') value.headwater = (value.headwater ?? 0) + 1;
    });
    const allReversed = alter((value) => {
      if (value.kind === 'line') value.points.reverse();
    });
    const tracedWorse = alter((value) => {
      if (value.kind === 'netCount') value.tracingAccuracyPx = 3;
    });
    expect([headwaterUp, allReversed, tracedWorse]).toEqual([null, null, null]);
    expect(reader.readPoints({ ...traced, datum: 'another' })).toBeNull();
  });
});
