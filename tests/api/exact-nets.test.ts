import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { KN_PER_M3_PER_PCF, METRES_PER_FOOT } from '#shared/compute/units.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';
import { scheduleThroughApi } from '#tests/support/exact-nets/trace-through-api.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const COUNT = 120;

function expectRead(reading: NetReading): void {
  expect(reading.state, reading.findings.map((finding) => finding.text).join(' ')).toBe('read');
  expect(reading.points.filter((point) => point.status !== 'read')).toEqual([]);
}

const byName = (reading: NetReading) =>
  [...reading.points].sort((a, b) => Number(a.name.slice(1)) - Number(b.name.slice(1)));

describe.each(EXACT_NETS)(
  '$name through upload, calibration, commands and schedule',
  ({ net, pxPerUnit }) => {
    const readings = randomReadings(net, COUNT, 31);

    it('agrees with the closed form within 0.08 drop at the 95th percentile and 0.25 drop at worst', async () => {
      const reading = await scheduleThroughApi(
        app,
        exactNetDocument(net, { pxPerUnit, readings, turnDeg: 1.1 }),
      );
      expectRead(reading);
      const drop = (net.headwater - net.outHead) / net.drops;
      const errors = byName(reading)
        .map((point, i) => Math.abs(point.totalHead! - net.headAt(...readings[i]!.at)) / drop)
        .sort((a, b) => a - b);
      expect(errors[Math.floor(0.95 * COUNT)]).toBeLessThan(0.08);
      expect(errors[COUNT - 1]).toBeLessThan(0.25);
    });
  },
);

describe('the same net in SI and in US customary units, through the API', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const readings = randomReadings(net, 30, 37);

  it('gives the same drops, and with matched γw the same pressures', async () => {
    const lengthFactor = 1 / METRES_PER_FOOT;
    const feet = { unitSystem: 'US' as const, lengthFactor, pxPerUnit: pxPerUnit / lengthFactor };
    // 62.4 lb/ft³ is 9.802 kN/m³ (1 lb = 4.4482216 N, 1 ft = 0.3048 m, both exact to the figures given), not 9.81.
    const si = await scheduleThroughApi(
      app,
      exactNetDocument(net, { pxPerUnit, readings, gammaW: 62.4 * KN_PER_M3_PER_PCF }),
    );
    const us = await scheduleThroughApi(app, exactNetDocument(net, { ...feet, readings, gammaW: 62.4 }));
    expectRead(si);
    expectRead(us);
    const inUs = byName(us);
    byName(si).forEach((point, i) => {
      expect(inUs[i]!.dropsLost).toBeCloseTo(point.dropsLost!, 5);
      // 1 lb/ft² = 4.4482216 N / (0.3048 m)² = 0.04788026 kPa.
      expect(inUs[i]!.porePressure! * 0.047_880_26).toBeCloseTo(point.porePressure!, 3);
    });
  });
});
