import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { KN_PER_M3_PER_PCF, METRES_PER_FOOT } from '#shared/compute/units.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';

const COUNT = 300;

/** Errors of the total heads in drops, ascending, against the closed form. */
function errorsOf({ net, pxPerUnit }: (typeof EXACT_NETS)[number], tracing: Tracing = {}): number[] {
  const readings = randomReadings(net, COUNT, 11);
  const reading = readNet(exactNetDocument(net, { pxPerUnit, readings, ...tracing }));
  expect(reading.state).toBe('read');
  const drop = (net.headwater - net.outHead) / net.drops;
  return reading.points
    .map((point, i) => {
      expect(point.status, point.reason?.text).toBe('read');
      return Math.abs(point.byHand!.totalHead - net.headAt(...readings[i]!.at)) / drop;
    })
    .sort((a, b) => a - b);
}

describe.each(EXACT_NETS)('readings of an exact net: $name', (entry) => {
  const { net, pxPerUnit } = entry;

  it('by hand agree with the closed form within 0.08 drop at the 95th percentile and 0.25 drop at worst', () => {
    const errors = errorsOf(entry);
    expect(errors[Math.floor(0.95 * COUNT)]).toBeLessThan(0.08);
    expect(errors[COUNT - 1]).toBeLessThan(0.25);
  });

  it('by hand still do so at the 95th percentile when the hand trembles by 1.5 px', () => {
    for (const seed of [1, 2, 3]) {
      const errors = errorsOf(entry, { jitterPx: 1.5, seed });
      expect(errors[Math.floor(0.95 * COUNT)]).toBeLessThan(0.08);
      expect(errors[COUNT - 1]).toBeLessThan(0.35);
    }
  });

  it('are u = γw(h − z) and lie between the two heads', () => {
    const readings = randomReadings(net, 60, 5);
    const { points } = readNet(exactNetDocument(net, { pxPerUnit, readings, jitterPx: 1.5 }));
    for (const point of points) {
      expect(point.porePressure).toBeCloseTo(9.81 * (point.totalHead! - point.elevation!), 9);
      expect(point.pressureHead).toBeCloseTo(point.totalHead! - point.elevation!, 12);
      expect(point.totalHead).toBeLessThanOrEqual(net.headwater + 1e-9);
      expect(point.totalHead).toBeGreaterThanOrEqual(net.outHead - 0.01);
    }
  });

  it('count drops and channels as drawn', () => {
    const { quantities } = readNet(exactNetDocument(net, { pxPerUnit, jitterPx: 1.5 }));
    expect(quantities.drops).toBe(net.drops);
    expect(quantities.tracedDrops).toBe(net.drops);
    expect(quantities.channels).toBe(net.channels);
    expect(quantities.channelsComplete).toBe(net.bounded);
    // q = k·H·Nf/Nd with k = 2.5e-6 m/s (Forchheimer); the level drain's own elevation trembles with the hand.
    const seepage = (2.5e-6 * (net.headwater - net.outHead) * net.channels) / net.drops;
    expect(quantities.seepage! / seepage).toBeCloseTo(1, 3);
  });

  it('are the same drops in SI and US units, and the same pressures with matched unit weights of water', () => {
    const readings = randomReadings(net, 50, 3, 0.1);
    const si = readNet(exactNetDocument(net, { pxPerUnit, readings, gammaW: 62.4 * KN_PER_M3_PER_PCF }));
    const us = readNet(
      exactNetDocument(net, {
        pxPerUnit: pxPerUnit * METRES_PER_FOOT,
        lengthFactor: 1 / METRES_PER_FOOT,
        unitSystem: 'US',
        readings,
      }),
    );
    us.points.forEach((point, i) => {
      const other = si.points[i]!;
      expect(point.byHand!.dropsLost).toBeCloseTo(other.byHand!.dropsLost, 9);
      // Rounding of the lengths may lay an element of the field otherwise.
      expect(Math.abs(point.dropsLost! - other.dropsLost!)).toBeLessThan(0.004);
      // 1 psf = 0.04788026 kPa (published check 5-16, exact definitions). A drop is at most 2 m, 20 kPa.
      expect(Math.abs(point.porePressure! * 0.047880259 - other.porePressure!)).toBeLessThan(0.08);
    });
    expect(us.quantities.seepage! * METRES_PER_FOOT ** 2).toBeCloseTo(si.quantities.seepage!, 12);
  });
});
