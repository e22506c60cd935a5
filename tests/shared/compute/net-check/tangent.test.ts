import { describe, expect, it } from 'vitest';
import { angleBetween } from '#shared/compute/cells/quadrilateral.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { lengthOf, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { tangentOfBoundary, tangentOfCurve } from '#shared/compute/net-check/tangent.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

const RADIUS = 200;
const arc = (jitter = 0, seed = 1, step = 0.07) => {
  const noise = seededNoise(seed);
  return polylineOf(
    Array.from(
      { length: 30 },
      (_, i): Pair => [
        RADIUS * Math.cos(i * step) + jitter * noise(),
        RADIUS * Math.sin(i * step) + jitter * noise(),
      ],
    ),
  )!;
};

/** Degrees between a direction and the tangent of the circle at an angle. */
const offTangent = (direction: Pair, turn: number) =>
  angleBetween(direction, [-Math.sin(turn), Math.cos(turn)]);

describe('direction of a traced line', () => {
  it('is the tangent of a circle within half a degree, in the middle and at the end', () => {
    const line = arc();
    const middle = tangentOfCurve(line, lengthOf(line) / 2, 60, 0);
    expect(offTangent(middle.direction, 14.5 * 0.07)).toBeLessThan(0.1);
    const end = tangentOfCurve(line, 0, 100, 0);
    expect(offTangent(end.direction, 0)).toBeLessThan(1);
  });

  it('strays under the hand’s tremor as its standard deviation says', () => {
    for (const [s, window, turn] of [
      [203, 60, 14.5 * 0.07],
      [0, 90, 0],
    ] as const) {
      const off = Array.from({ length: 300 }, (_, seed) => {
        const { direction, tremor } = tangentOfCurve(arc(1.5, seed + 1), s, window, 1.5);
        return (offTangent(direction, turn) * Math.PI) / 180 / tremor;
      });
      const spread = Math.sqrt(off.reduce((sum, value) => sum + value * value, 0) / off.length);
      // Root mean square of a standard normal is 1; a circle is no parabola, which shows at an end.
      expect(spread).toBeGreaterThan(0.6);
      expect(spread).toBeLessThan(1.3);
    }
  });

  it('is known worse at the end of a line with vertices far apart, and not worse than that', () => {
    for (const step of [0.15, 0.3, 0.6]) {
      const { direction, tremor } = tangentOfCurve(arc(0, 1, step), 0, 20, 0.001);
      expect(tremor).toBeCloseTo(step / 4, 3);
      expect((offTangent(direction, 0) * Math.PI) / 180).toBeLessThan(tremor);
    }
  });

  it('of a straight boundary is its own up to its corners', () => {
    const floor = polylineOf([
      [0, 0],
      [100, 0],
      [100, 80],
    ])!;
    const { direction } = tangentOfBoundary(floor, 50, 40, 1);
    expect(offTangent(direction, -Math.PI / 2)).toBeLessThan(1e-9);
  });

  it('of two vertices is the line through them', () => {
    const { direction } = tangentOfCurve(
      polylineOf([
        [0, 0],
        [3, 4],
      ])!,
      2,
      10,
      1,
    );
    expect(direction[0]).toBeCloseTo(0.6, 12);
    expect(direction[1]).toBeCloseTo(0.8, 12);
  });

  it('is that of the run before where a segment is lost in rounding', () => {
    const line = polylineOf([
      [0, 0],
      [1e6, 0],
      [1e6, 1e-12],
    ])!;
    const { direction, tremor } = tangentOfCurve(line, 1e6, 10, 1);
    expect(angleBetween(direction, [1, 0])).toBeLessThan(90.1);
    expect(Number.isFinite(tremor)).toBe(true);
    expect(Math.hypot(...direction)).toBeCloseTo(1, 12);
  });
});

it('two straight lines cross at the angle of the published case 7-06', () => {
  const first = polylineOf([
    [0, 0],
    [10, 4],
  ])!;
  const second = polylineOf([
    [3, 6],
    [6, -1],
  ])!;
  const [crossing] = crossingsOf(first, second);
  const angle = angleBetween(
    tangentOfCurve(first, crossing!.s, 5, 0).direction,
    tangentOfCurve(second, crossing!.t, 5, 0).direction,
  );
  // Case 7-06 of the shared checks (own arithmetic there): 88.60282 degrees, 1.397181 from 90.
  expect(Math.min(angle, 180 - angle)).toBeCloseTo(88.60282, 5);
});
