import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { apronDrainDocument, apronDrainNet } from '#tests/support/exact-nets/apron-drain-net.ts';
import type { Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import {
  drawnInAnotherOrder,
  someLinesReversed,
  withMoreVertices,
} from '#tests/support/exact-nets/redrawn.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

/** In drops: how far the finite elements of the same net differ when it lies otherwise on the sheet. */
const SAME_FIELD = 0.03;

describe.each([100.2, 100])('a net with a drain below its tailwater of %d', (tailwater) => {
  const net = apronDrainNet({ tailwater, drainHead: 98.25 });
  const places = net.places(6, seededRandom(9));
  const traced = (tracing: Tracing = {}) =>
    apronDrainDocument(net, { readings: places.map((at) => ({ at, clicked: true })), ...tracing });

  /** Everything that hangs on order and count, and the heads read, whatever the lines are called. */
  function read(document: FlowNetDocument) {
    const { state, lines, points, quantities } = readNet(document);
    const head = points[0]!.totalHead;
    return {
      state,
      drops: lines.map((line) => line.drops).sort((a, b) => a! - b!),
      outlets: quantities.outlets.map(({ label, drops, channels }) => ({ label, drops, channels })),
      heads: [...points].sort((a, b) => (a.name < b.name ? -1 : 1)).map(({ totalHead }) => totalHead ?? head),
    };
  }
  const plain = read(traced());

  function expectSame(document: FlowNetDocument): void {
    const { heads, drops, outlets, state } = read(document);
    expect(state).toBe('read');
    drops.forEach((count, i) => {
      expect(count).toBeCloseTo(plain.drops[i]!, 9);
    });
    expect(outlets.map(({ label, channels }) => [label, channels])).toEqual(
      plain.outlets.map(({ label, channels }) => [label, channels]),
    );
    heads.forEach((head, i) => {
      expect(Math.abs(head! - plain.heads[i]!)).toBeLessThan(SAME_FIELD * net.headPerDrop);
    });
  }

  it('is ordered, counted and read alike turned, shifted and mirrored', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -45, max: 45, noNaN: true }),
        fc.double({ min: -5000, max: 5000, noNaN: true }),
        fc.boolean(),
        (turnDeg, shift, mirrored) => {
          expectSame(traced({ turnDeg, mirrored, centre: [2500 + shift, 1750 - shift] }));
        },
      ),
      { numRuns: 5 },
    );
  });

  it('is ordered, counted and read alike in another order of drawing and with lines the other way round', () => {
    fc.assert(
      fc.property(fc.nat(1_000_000), (seed) => {
        expectSame(drawnInAnotherOrder(traced(), seed));
        expectSame(someLinesReversed(traced(), seed));
      }),
      { numRuns: 4 },
    );
  });

  it('is ordered, counted and read alike with more vertices, at another scale, and with a trembling hand', () => {
    expectSame(withMoreVertices(traced()));
    expectSame(traced({ pxPerUnit: 80, spacingPx: 14 * 1.6 }));
    for (const seed of [1, 2]) {
      const { drops, outlets, state } = read(traced({ jitterPx: 1.5, seed }));
      expect(state).toBe('read');
      expect(drops).toEqual(plain.drops);
      expect(outlets.map(({ channels }) => channels)).toEqual([10, 1]);
    }
  });

  it('is the same in feet', () => {
    const us = read(traced({ unitSystem: 'US', lengthFactor: 1 / 0.3048, pxPerUnit: 50 * 0.3048 }));
    expect(us.state).toBe('read');
    us.drops.forEach((count, i) => {
      expect(count).toBeCloseTo(plain.drops[i]!, 9);
    });
  });
});
