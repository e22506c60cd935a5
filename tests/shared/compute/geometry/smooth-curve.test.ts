import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { smoothCurve } from '#shared/compute/geometry/smooth-curve.ts';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';

const place = fc.tuple(fc.integer({ min: 0, max: 4000 }), fc.integer({ min: 0, max: 4000 }));
const circle = (count: number, turn: number, radius = 300): Pair[] =>
  Array.from({ length: count }, (_, i) => {
    const angle = (turn * i) / (count - 1);
    return [1000 + radius * Math.cos(angle), 1000 + radius * Math.sin(angle)];
  });
const strayFromCircle = (line: readonly Pair[]) =>
  Math.max(...line.map(([x, y]) => Math.abs(Math.hypot(x - 1000, y - 1000) - 300)));

describe('a smooth curve', () => {
  it('through fewer than three places is what is there', () => {
    expect(smoothCurve([], 0.25)).toEqual([]);
    expect(smoothCurve([[3, 4]], 0.25)).toEqual([[3, 4]]);
    const twice: Pair[] = [
      [3, 4],
      [3, 4],
      [9, 4],
    ];
    expect(smoothCurve(twice, 0.25)).toEqual([
      [3, 4],
      [9, 4],
    ]);
  });

  it('goes through every place in order', () => {
    fc.assert(
      fc.property(fc.uniqueArray(place, { minLength: 3, maxLength: 12, selector: String }), (places) => {
        const line = smoothCurve(places, 0.25);
        let from = 0;
        for (const knot of places) {
          const at = line.findIndex((each, i) => i >= from && each[0] === knot[0] && each[1] === knot[1]);
          expect(at).toBeGreaterThanOrEqual(from);
          from = at;
        }
      }),
      { numRuns: 100 },
    );
  });

  // A Catmull–Rom span is a cubic: of a circle clicked every 18° it misses by some 4e-5 of the radius inside.
  it('through 11 clicks on half a circle of radius 300 is that circle within 0.1 px', () => {
    const line = smoothCurve(circle(11, Math.PI), 0.02);
    expect(strayFromCircle(line)).toBeLessThan(0.1);
  });

  it('closes smoothly when the last click is the first', () => {
    const places = circle(21, 2 * Math.PI);
    places[20] = places[0]!;
    expect(strayFromCircle(smoothCurve(places, 0.02))).toBeLessThan(0.1);
  });

  it('is the parabola within a hundredth of its height, clicked at nine places', () => {
    const parabola = (x: number): Pair => [x, (x * x) / 400];
    const line = smoothCurve(
      Array.from({ length: 9 }, (_, i) => parabola(50 * i)),
      0.05,
    );
    for (const [x, y] of line) expect(Math.abs(y - parabola(x)[1])).toBeLessThan(2);
    for (const [x, y] of line.filter(([x]) => x > 50 && x < 350)) {
      expect(Math.abs(y - parabola(x)[1])).toBeLessThan(0.5);
    }
  });

  it('stays within the tolerance of its finest form, with a vertex at least every 24 px on short spans', () => {
    const places: Pair[] = [
      [100, 100],
      [180, 260],
      [400, 300],
      [520, 120],
    ];
    const fine = smoothCurve(places, 0.0005);
    const line = smoothCurve(places, 0.25);
    for (const vertex of fine) {
      const strays = line.slice(1).map((end, i) => distanceToSegment(vertex, line[i]!, end));
      expect(Math.min(...strays)).toBeLessThan(0.25);
    }
    const longest = Math.max(
      ...line.slice(1).map(([x, y], i) => Math.hypot(x - line[i]![0], y - line[i]![1])),
    );
    expect(longest).toBeLessThan(40);
    expect(line.length).toBeLessThan(60);
  });

  it('reversed is the same curve, and turned and moved it is turned and moved', () => {
    const places = circle(7, 2).map(([x, y], i): Pair => [x + 9 * (i % 3), y - 7 * (i % 2)]);
    const line = smoothCurve(places, 0.25);
    const back = smoothCurve([...places].reverse(), 0.25).reverse();
    const turned = smoothCurve(
      places.map(([x, y]): Pair => [50 - y, 20 + x]),
      0.25,
    );
    expect(back).toHaveLength(line.length);
    line.forEach(([x, y], i) => {
      expect(back[i]![0]).toBeCloseTo(x, 8);
      expect(back[i]![1]).toBeCloseTo(y, 8);
      expect(turned[i]![0]).toBeCloseTo(50 - y, 8);
      expect(turned[i]![1]).toBeCloseTo(20 + x, 8);
    });
  });
});
