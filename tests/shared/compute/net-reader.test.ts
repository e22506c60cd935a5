import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createNetReader } from '#shared/compute/net-reader.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
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
        expect(reader.read(document)).toEqual(readNet(structuredClone(document)));
      }),
      { numRuns: 60 },
    );
  });
});
