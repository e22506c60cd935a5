import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { arbitraryDocument } from '#tests/support/arbitrary-document.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { freeOutflowNet } from '#tests/support/exact-nets/free-outflow-net.ts';
import { type RandomReading, randomReadings } from '#tests/support/exact-nets/random-readings.ts';

const COUNT = 200;

function readField(document: FlowNetDocument): Array<{ totalHead: number | null; dropsLost: number | null }> {
  return readNet(document).points.map(({ byField }) => byField ?? { totalHead: null, dropsLost: null });
}

describe.each(EXACT_NETS)('the field between traced lines: $name', ({ net, pxPerUnit }) => {
  const drop = (net.headwater - net.outHead) / net.drops;
  const readings = randomReadings(net, COUNT, 11);

  function errorsOf(jitterPx: number, seed: number): number[] {
    const document = exactNetDocument(net, { pxPerUnit, readings, jitterPx, seed });
    return readField(document)
      .map(({ totalHead }, i) => Math.abs(totalHead! - net.headAt(...readings[i]!.at)) / drop)
      .sort((a, b) => a - b);
  }

  it('is exact within 0.015 drop everywhere when the lines are exact', () => {
    const errors = errorsOf(0, 1);
    expect(errors[Math.floor(0.95 * COUNT)]).toBeLessThan(0.005);
    expect(errors[COUNT - 1]).toBeLessThan(0.015);
  });

  it('gives drops that fit its heads, between the two lines', () => {
    const document = exactNetDocument(net, { pxPerUnit, readings: readings.slice(0, 40), jitterPx: 1.5 });
    const hand = readNet(document);
    const outHead = net.headwater - hand.quantities.headLost!;
    readField(document).forEach(({ totalHead, dropsLost }, i) => {
      expect(totalHead).toBeCloseTo(net.headwater - (dropsLost! / net.drops) * (net.headwater - outHead), 8);
      expect(Math.floor(dropsLost! + 1e-9)).toBe(Math.floor(hand.points[i]!.dropsLost! + 1e-9));
    });
  });
});

describe('the field', () => {
  const { net, pxPerUnit } = EXACT_NETS[2]!;

  it('jumps across a thin wall', () => {
    const readings: RandomReading[] = [
      { at: [-0.05, 97], clicked: true },
      { at: [0.05, 97], clicked: true },
    ];
    const [upstream, downstream] = readField(exactNetDocument(net, { pxPerUnit, readings }));
    readings.forEach(({ at }, i) => {
      const read = [upstream, downstream][i]!.totalHead!;
      expect(Math.abs(read - net.headAt(...at)) / 0.4).toBeLessThan(0.02);
    });
    expect(upstream!.totalHead! - downstream!.totalHead!).toBeGreaterThan(2);
  });

  it('is not read outside the net nor in a net that is not finished', () => {
    const readings: RandomReading[] = [{ at: [0, 120], clicked: false }];
    const document = exactNetDocument(net, { pxPerUnit, readings });
    expect(readField(document)[0]).toMatchObject({ totalHead: null, dropsLost: null });
    const inside = exactNetDocument(net, { pxPerUnit, readings: randomReadings(net, 1, 2) });
    const unstated = changed(inside, 'netCount', (value) => ({ ...value, drops: null }));
    expect(readField(unstated)[0]).toMatchObject({ totalHead: null, dropsLost: null });
    const unset = changed(inside, 'knownPoint', () => null);
    expect(readField(unset)[0]).toMatchObject({ totalHead: null, dropsLost: null });
  });

  it('has h = z on a face of free outflow and keeps within the prescribed heads', () => {
    const places = [0.2, 0.8, 1.5, 2.5, 3.2].map((z) => ({ at: [9.995, z] as const }));
    for (const { totalHead } of readField(freeOutflowNet(places))) expect(totalHead).not.toBeNull();
    readField(freeOutflowNet(places)).forEach(({ totalHead }, i) => {
      expect(Math.abs(totalHead! - places[i]!.at[1])).toBeLessThan(0.06);
    });
    const inner = [1, 3, 5, 7, 9].map((x) => ({ at: [x, 0.5] as const }));
    const heads = readField(freeOutflowNet(inner)).map(({ totalHead }) => totalHead!);
    heads.forEach((head, i) => {
      expect(head).toBeLessThan(heads[i - 1] ?? 10);
      expect(head).toBeGreaterThan(0);
    });
  });

  it('agrees with the hand rule but for the fraction', () => {
    const readings = randomReadings(net, 100, 9, 0.15);
    const document = exactNetDocument(net, { pxPerUnit, readings });
    const hand = readNet(document).points;
    readField(document).forEach(({ dropsLost }, i) => {
      expect(Math.abs(dropsLost! - hand[i]!.byHand!.dropsLost)).toBeLessThan(0.25);
    });
  });
});

describe('the field of a document of any kind', () => {
  it('is answered without an exception and with finite heads', () => {
    fc.assert(
      fc.property(arbitraryDocument(), (document) => {
        for (const { totalHead } of readField(document)) {
          expect(totalHead === null || Number.isFinite(totalHead)).toBe(true);
        }
      }),
      { numRuns: 150 },
    );
  });
});
