import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';
import {
  drawnInAnotherOrder,
  someLinesReversed,
  withMoreVertices,
} from '#tests/support/exact-nets/redrawn.ts';

/** In drops: coordinates of 1e4 px to double precision, times the steepest cell, with room to spare. */
const SAME = 1e-9;
/** In drops: the elements of the field lie otherwise on a turned sheet, and it is as exact as they are small. */
const SAME_FIELD = 0.015;

/** Drops lost at each point, in the order of the points' names; the same places are asked in every variant. */
function dropsOf(reading: NetReading): Array<{ byHand: number; byField: number }> {
  expect(reading.state, reading.findings.map((found) => found.text).join(' ')).toBe('read');
  return [...reading.points]
    .sort((a, b) => Number(a.name.slice(1)) - Number(b.name.slice(1)))
    .map(({ byHand, byField }) => ({
      byHand: byHand?.dropsLost ?? Number.NaN,
      byField: byField?.dropsLost ?? Number.NaN,
    }));
}

function expectSame(actual: ReturnType<typeof dropsOf>, expected: ReturnType<typeof dropsOf>): void {
  actual.forEach((drops, i) => {
    expect(Math.abs(drops.byHand - expected[i]!.byHand)).toBeLessThan(SAME);
    expect(Math.abs(drops.byField - expected[i]!.byField)).toBeLessThan(SAME_FIELD);
  });
}

describe.each(EXACT_NETS)(
  'a reading does not depend on how the net lies on the sheet: $name',
  ({ net, pxPerUnit }) => {
    const readings = randomReadings(net, 40, 21, 0.1).map((reading) => ({ ...reading, clicked: true }));
    const traced = (tracing: Tracing = {}) => exactNetDocument(net, { pxPerUnit, readings, ...tracing });
    const plain = dropsOf(readNet(traced()));

    it('is unchanged by turning, shifting and mirroring the sheet', () => {
      fc.assert(
        fc.property(
          fc.double({ min: -45, max: 45, noNaN: true }),
          fc.double({ min: -5000, max: 5000, noNaN: true }),
          fc.boolean(),
          (turnDeg, shift, mirrored) => {
            const drops = dropsOf(
              readNet(traced({ turnDeg, mirrored, centre: [2500 + shift, 1750 - shift] })),
            );
            expectSame(drops, plain);
          },
        ),
        {
          numRuns: 12,
          // Base and drain of the parabola run into one another: turned so, rounding once moved their meeting.
          examples: [
            [-4.849680575135026, 0, false],
            [-4.849680575135026, 0, true],
          ],
        },
      );
    });

    it('is unchanged by scaling the sheet, but for the vertices falling elsewhere', () => {
      for (const scale of [0.5, 2]) {
        const drops = dropsOf(readNet(traced({ pxPerUnit: pxPerUnit * scale, spacingPx: 14 * scale })));
        expectSame(drops, plain);
      }
    });

    it('is unchanged by the order of drawing and the direction of the lines', () => {
      fc.assert(
        fc.property(fc.nat(1_000_000), (seed) => {
          expectSame(dropsOf(readNet(drawnInAnotherOrder(traced(), seed))), plain);
          expectSame(dropsOf(readNet(someLinesReversed(traced(), seed))), plain);
        }),
        { numRuns: 8 },
      );
    });

    it('is unchanged by more vertices on the same lines', () => {
      expectSame(dropsOf(readNet(withMoreVertices(traced()))), plain);
    });
  },
);
