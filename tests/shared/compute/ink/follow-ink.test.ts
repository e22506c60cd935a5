import { describe, expect, it } from 'vitest';
import { INK_LOOKS, inkScan } from '#server/bench/ink-scan.ts';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import { followInk } from '#shared/compute/ink/follow-ink.ts';
import { inkMapOf } from '#shared/compute/ink/ink-window.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

type Place = readonly [number, number];

/** Distances of the true middle's places from the followed line and the other way round, ascending. */
function distances(line: readonly Place[], middle: readonly Place[]): number[] {
  const to = (place: Place, path: readonly Place[]) => {
    let least = Number.POSITIVE_INFINITY;
    for (let i = 1; i < path.length; i += 1) {
      least = Math.min(least, distanceToSegment([...place], [...path[i - 1]!], [...path[i]!]));
    }
    return least;
  };
  return middle
    .filter((_, i) => i % 4 === 0)
    .map((place) => to(place, line))
    .sort((a, b) => a - b);
}

// The scans are drawn in code, so that the middle of the stroke is known.
describe('a followed line', () => {
  it.each(Object.keys(INK_LOOKS))('lies within 1.5 px of the middle of the stroke on a %s scan', (name) => {
    const all: number[] = [];
    for (const seed of [1, 2, 3]) {
      const { window, from, to, middle } = inkScan({ ...INK_LOOKS[name]!, seed });
      const { line } = followInk(window, from, to);
      all.push(...distances(line, middle));
      expect(line.length).toBeLessThan(120);
    }
    all.sort((a, b) => a - b);
    expect(all[Math.floor(0.95 * all.length)]).toBeLessThan(1.5);
  });

  it('takes hold of the stroke when a click misses it a little', () => {
    const { window, from, to, middle } = inkScan({ ...INK_LOOKS.toned!, seed: 4 });
    const { line } = followInk(window, [from[0], from[1] + 3], [to[0], to[1] - 3]);
    expect(Math.hypot(line[0]![0] - from[0], line[0]![1] - from[1])).toBeLessThan(2.5);
    expect(distances(line, middle)[0]).toBeLessThan(1.5);
  });

  it('runs on ink for most of its length, and over paper with a texture for little of it', () => {
    const { window, from, to } = inkScan({ ...INK_LOOKS.faded!, seed: 5 });
    expect(followInk(window, from, to).onInk).toBeGreaterThan(0.75);
    const noise = seededNoise(3);
    const paper = { width: 400, height: 300, grey: new Uint8Array(120_000).map(() => 200 + 15 * noise()) };
    expect(followInk(paper, [40, 150], [360, 160]).onInk).toBeLessThan(0.45);
  });

  it('is the same on a scan turned over into white on black', () => {
    const { window, from, to, middle } = inkScan({ ...INK_LOOKS.toned!, seed: 6 });
    const inverted = { ...window, grey: window.grey.map((value) => 255 - value) };
    const { line, onInk } = followInk(inverted, from, to);
    expect(onInk).toBeGreaterThan(0.75);
    expect(line).toEqual(followInk(window, from, to).line);
    expect(distances(line, middle).at(-1)).toBeLessThan(4);
  });

  it('takes hold from farther away when the view is small', () => {
    const { window, from, to } = inkScan({ ...INK_LOOKS.clean!, seed: 4 });
    const { line } = followInk(window, [from[0], from[1] + 12], [to[0], to[1] - 12], 16);
    expect(Math.hypot(line[0]![0] - from[0], line[0]![1] - from[1])).toBeLessThan(6);
  });

  it('is straight over empty paper', () => {
    const empty = { width: 200, height: 100, grey: new Uint8Array(20_000).fill(240) };
    const { line } = followInk(empty, [10, 50], [180, 50]);
    expect(line).toHaveLength(2);
    expect(line[0]![1]).toBeCloseTo(50.5, 6);
  });

  it('joins two clicks on one pixel without a search', () => {
    const empty = { width: 20, height: 20, grey: new Uint8Array(400).fill(240) };
    expect(followInk(empty, [5.2, 5.3], [5.6, 5.4]).line).toEqual([
      [5.2, 5.3],
      [5.6, 5.4],
    ]);
  });

  it('stays inside the window when a click lies outside', () => {
    const empty = { width: 60, height: 60, grey: new Uint8Array(3600).fill(240) };
    for (const [x, y] of followInk(empty, [-20, 30], [200, 30]).line) {
      expect(x).toBeGreaterThanOrEqual(0);
      expect(x).toBeLessThanOrEqual(60);
      expect(y).toBeGreaterThanOrEqual(0);
    }
  });
});

it('an ink map of plain paper, light or dark, is empty', () => {
  for (const tone of [250, 120, 30]) {
    const grey = new Uint8Array(10_000).map((_, i) => tone + (i % 5));
    expect(Math.max(...inkMapOf({ width: 100, height: 100, grey }).ink)).toBe(0);
  }
});
