import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ExactPlace } from '#shared/compute/exact/exact-net.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { KN_PER_M3_PER_PCF, METRES_PER_FOOT } from '#shared/compute/units.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const part = fc.double({ min: 0.02, max: 0.98, noNaN: true });
const places = fc.array(fc.tuple(part, part), { minLength: 8, maxLength: 8 });

describe.each(EXACT_NETS)('readings on $name', ({ net, pxPerUnit }) => {
  const at = ([along, across]: readonly [number, number]): ExactPlace =>
    net.placeAt(along * net.drops, across * net.channels);
  const clicked = (list: readonly ExactPlace[]) => list.map((place) => ({ at: place, clicked: false }));

  it('have u = γw(h − z), and heads within the least and the greatest prescribed one', () => {
    fc.assert(
      fc.property(places, fc.integer({ min: 1, max: 1000 }), (list, seed) => {
        const readings = clicked(list.map(at));
        const { points } = readNet(exactNetDocument(net, { pxPerUnit, jitterPx: 1.5, seed, readings }));
        const read = points.filter(({ status }) => status === 'read');
        expect(read.length).toBeGreaterThan(0);
        for (const { totalHead, elevation, pressureHead, porePressure } of read) {
          expect(pressureHead).toBeCloseTo(totalHead! - elevation!, 10);
          expect(porePressure).toBeCloseTo(9.81 * (totalHead! - elevation!), 8);
          expect(totalHead!).toBeLessThanOrEqual(net.headwater + 1e-9);
          expect(totalHead!).toBeGreaterThanOrEqual(net.outHead - 1e-9);
        }
      }),
      { numRuns: 3 },
    );
  });

  it('lose drops all along a flow line', () => {
    for (const channel of [0.35, 0.6]) {
      const along = Array.from({ length: 31 }, (_, i) =>
        net.placeAt(((i + 0.5) / 31) * net.drops, channel * net.channels),
      );
      const { points } = readNet(exactNetDocument(net, { pxPerUnit, readings: clicked(along) }));
      const drops = points.filter(({ status }) => status === 'read').map(({ dropsLost }) => dropsLost!);
      expect(drops.length).toBeGreaterThan(28);
      for (const [i, lost] of drops.entries()) if (i > 0) expect(lost).toBeGreaterThan(drops[i - 1]!);
    }
  });

  it('agree in SI and in US units with matched γw', () => {
    const list = [0.1, 0.3, 0.5, 0.7, 0.9].map((along) => at([along, 0.4]));
    const feet = 1 / METRES_PER_FOOT;
    const si = readNet(exactNetDocument(net, { pxPerUnit, readings: clicked(list) }));
    const us = readNet(
      exactNetDocument(net, {
        pxPerUnit: pxPerUnit / feet,
        lengthFactor: feet,
        unitSystem: 'US',
        gammaW: 9.81 / KN_PER_M3_PER_PCF,
        readings: clicked(list),
      }),
    );
    expect(si.points.filter(({ status }) => status === 'read').length).toBeGreaterThan(3);
    for (const [i, { status, totalHead, porePressure }] of si.points.entries()) {
      if (status !== 'read') continue;
      const other = us.points[i]!;
      expect(other.totalHead! * METRES_PER_FOOT).toBeCloseTo(totalHead!, 6);
      // lb/ft² to kPa by the feet and the pounds: γw in kN/m³ times metres.
      expect(other.porePressure! * KN_PER_M3_PER_PCF * METRES_PER_FOOT).toBeCloseTo(porePressure!, 5);
    }
    for (const [i, { cellGradient }] of si.exits.entries())
      expect(us.exits[i]!.cellGradient!).toBeCloseTo(cellGradient!, 6);
  });
});
