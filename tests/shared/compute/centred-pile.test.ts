import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { centredPileNet } from '#tests/support/exact-nets/centred-pile-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';

const COUNT = 150;
const floor = (drops: number, depth: number) =>
  centredPileNet({ width: 20, depth, headwater: 106, tailwater: 100, drops, channels: 5, middle: [0, 98] });

describe('a floor with a pile under its middle, outlined on both sides of the pile', () => {
  it('has the heads at the corners and the tip of the pile (published check 1B-04, Khosla, Bose and Taylor)', () => {
    const net = centredPileNet({
      width: 20,
      depth: 5,
      headwater: 1,
      tailwater: 0,
      drops: 10,
      channels: 5,
      middle: [0, 0],
    });
    expect(net.headAt(-1e-9, -1e-9)).toBeCloseTo(0.6475836, 6);
    expect(net.headAt(1e-9, -5)).toBeCloseTo(0.5, 4);
    expect(net.headAt(1e-9, -1e-9)).toBeCloseTo(0.3524164, 6);
  });

  // An odd count leaves the tip inside a cell, an even one lays a line on it.
  it.each([
    [9, 5],
    [10, 2],
    [14, 9],
  ])('is ordered and read with %i drops and a pile of %i m', (drops, depth) => {
    const net = floor(drops, depth);
    const readings = randomReadings(net, COUNT, 4);
    for (const jitterPx of [0, 1.5]) {
      const document = exactNetDocument(net, { pxPerUnit: 60, readings, jitterPx });
      const { state, points, quantities } = readNet(document);
      expect(state).toBe('read');
      expect(quantities.channels).toBe(5);
      const errors = points
        .map((point, i) => (Math.abs(point.totalHead! - net.headAt(...readings[i]!.at)) * drops) / 6)
        .sort((a, b) => a - b);
      expect(errors[Math.floor(0.95 * COUNT)]).toBeLessThan(0.08);
      expect(errors[COUNT - 1]).toBeLessThan(0.25);
    }
  });

  it('has its field within 0.03 drop everywhere when the lines are exact', () => {
    const net = floor(9, 5);
    const readings = randomReadings(net, COUNT, 4);
    readNet(exactNetDocument(net, { pxPerUnit: 60, readings })).points.forEach(({ totalHead }, i) => {
      expect((Math.abs(totalHead! - net.headAt(...readings[i]!.at)) * 9) / 6).toBeLessThan(0.03);
    });
  });
});
