import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { simplifiedStroke } from '#shared/compute/geometry/simplify-stroke.ts';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

/** A hand's stroke along an arc of radius 300: a place every 4 px, each off by some tremor. */
function arcStroke(tremor: number): Pair[] {
  const noise = seededNoise(7);
  return Array.from({ length: 150 }, (_, i) => {
    const angle = (4 * i) / 300;
    const radius = 300 + tremor * noise();
    return [500 + radius * Math.cos(angle), 500 + radius * Math.sin(angle)];
  });
}
const strays = (line: readonly Pair[]) =>
  line
    .slice(1, -1)
    .map(([x, y]) => Math.abs(Math.hypot(x - 500, y - 500) - 300))
    .sort((a, b) => a - b);

describe('a stroke drawn freehand', () => {
  it('of nothing, or of one place held, stays a place', () => {
    expect(simplifiedStroke([], 1)).toEqual([]);
    expect(simplifiedStroke([[5, 5]], 1)).toEqual([[5, 5]]);
    expect(
      simplifiedStroke(
        [
          [5, 5],
          [5.1, 5],
        ],
        1,
      ),
    ).toEqual([[5, 5]]);
  });

  it('keeps its ends, and of a steady arc a vertex every 18 px or so, within half a pixel', () => {
    const stroke = arcStroke(0);
    const line = simplifiedStroke(stroke, 1);
    expect(line[0]).toEqual(stroke[0]);
    expect(line.at(-1)).toEqual(stroke.at(-1));
    expect(line.length).toBeLessThan(40);
    for (const place of stroke) {
      const off = line.slice(1).map((end, i) => distanceToSegment(place, line[i]!, end));
      expect(Math.min(...off)).toBeLessThan(0.51);
    }
  });

  it('loses most of its tremor', () => {
    const raw = strays(arcStroke(1));
    const line = strays(simplifiedStroke(arcStroke(1), 1));
    const rms = (all: number[]) => Math.sqrt(all.reduce((sum, each) => sum + each * each, 0) / all.length);
    expect(rms(line)).toBeLessThan(0.75 * rms(raw));
  });

  it('keeps a corner', () => {
    const corner: Pair[] = [
      ...Array.from({ length: 30 }, (_, i): Pair => [4 * i, 0]),
      ...Array.from({ length: 30 }, (_, i): Pair => [116, 4 * (i + 1)]),
    ];
    const line = simplifiedStroke(corner, 1);
    expect(Math.min(...line.map(([x, y]) => Math.hypot(x - 116, y)))).toBeLessThan(1.5);
    expect(line.length).toBeLessThan(8);
  });
});
