import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { tremorOf, withoutTremor } from '#shared/compute/geometry/tremor.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

const ACCURACY = 1.5;
const arc = (radius: number, spacing: number, count: number): Pair[] =>
  Array.from({ length: count }, (_, i) => {
    const angle = (i * spacing) / radius;
    return [radius * Math.cos(angle), radius * Math.sin(angle)];
  });

function trembled(points: readonly Pair[], seed: number, deviation = ACCURACY): Pair[] {
  const noise = seededNoise(seed);
  return points.map(([x, y]) => [x + deviation * noise(), y + deviation * noise()]);
}

const rootMeanSquare = (values: readonly number[]) =>
  Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);

describe('the tremor of a traced line', () => {
  it('is nothing on a smooth line, and on one too short to tell', () => {
    expect(tremorOf(arc(400, 14, 80))).toBeLessThan(0.01);
    expect(tremorOf([])).toBe(0);
    expect(tremorOf(trembled(arc(400, 14, 6), 1))).toBe(0);
    const smooth = arc(400, 14, 80);
    expect(withoutTremor(smooth, ACCURACY)).toBe(smooth);
  });

  it('is measured to two fifths of its standard deviation, corners or not', () => {
    const straight = Array.from({ length: 60 }, (_, i): Pair => [14 * i, 0]);
    const bent = [...straight, ...Array.from({ length: 60 }, (_, i): Pair => [14 * 59, 14 * (i + 1)])];
    for (let seed = 1; seed <= 10; seed += 1) {
      expect(Math.abs(tremorOf(trembled(arc(700, 14, 160), seed)) - ACCURACY)).toBeLessThan(0.6);
      expect(Math.abs(tremorOf(trembled(bent, seed)) - ACCURACY)).toBeLessThan(0.6);
    }
  });

  it('falls to less than half on an arc', () => {
    for (let seed = 1; seed <= 8; seed += 1) {
      const radius = 300;
      const off = (points: readonly Pair[]) =>
        rootMeanSquare(points.map(([x, y]) => Math.hypot(x, y) - radius));
      const points = trembled(arc(radius, 14, 120), seed);
      expect(off(withoutTremor(points, ACCURACY))).toBeLessThan(0.5 * off(points));
    }
  });

  it('leaves a corner where it is, and a vertex that strays far from the others', () => {
    const corner: Pair[] = [
      ...Array.from({ length: 30 }, (_, i): Pair => [14 * i, 0]),
      ...Array.from({ length: 30 }, (_, i): Pair => [14 * 29, 14 * (i + 1)]),
    ];
    for (let seed = 1; seed <= 8; seed += 1) {
      const points = trembled(corner, seed);
      const smooth = withoutTremor(points, ACCURACY);
      expect(Math.hypot(smooth[29]![0] - 14 * 29, smooth[29]![1])).toBeLessThan(4 * ACCURACY);
      points[10] = [140, 60];
      expect(withoutTremor(points, ACCURACY)[10]![1]).toBeGreaterThan(53);
    }
  });

  it('moves no vertex by more than a few tremors', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.tuple(
            fc.double({ min: 0, max: 500, noNaN: true }),
            fc.double({ min: 0, max: 500, noNaN: true }),
          ),
          {
            minLength: 2,
            maxLength: 60,
          },
        ),
        (points) => {
          const smooth = withoutTremor(points, ACCURACY);
          expect(smooth).toHaveLength(points.length);
          // Agreement is within 1.5 · 1.5 · 1.5 px · (1 + 1), the widest fit with the vertex itself.
          smooth.forEach(([x, y], i) => {
            expect(Math.hypot(x - points[i]![0], y - points[i]![1])).toBeLessThan(7);
          });
        },
      ),
    );
  });

  it('is taken off alike when the line is turned, shifted or reversed', () => {
    const points = trembled(arc(250, 14, 90), 3);
    const plain = withoutTremor(points, ACCURACY);
    const [cos, sin] = [Math.cos(0.7), Math.sin(0.7)];
    const turn = ([x, y]: Pair): Pair => [cos * x - sin * y + 4000, sin * x + cos * y - 900];
    withoutTremor(points.map(turn), ACCURACY).forEach(([x, y], i) => {
      const [px, py] = turn(plain[i]!);
      expect(Math.hypot(x - px, y - py)).toBeLessThan(1e-6);
    });
    [...withoutTremor([...points].reverse(), ACCURACY)].reverse().forEach(([x, y], i) => {
      expect(Math.hypot(x - plain[i]![0], y - plain[i]![1])).toBeLessThan(1e-6);
    });
  });
});
