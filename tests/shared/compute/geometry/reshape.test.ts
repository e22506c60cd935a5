import { describe, expect, it } from 'vitest';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { bendsOf, reshaped } from '#shared/compute/geometry/reshape.ts';
import { smoothCurve } from '#shared/compute/geometry/smooth-curve.ts';

const level = (count: number, step: number): Pair[] =>
  Array.from({ length: count }, (_, i) => [i * step, 100]);

describe('a dense line with one vertex dragged', () => {
  it('has its neighbours follow by the cosine of their distance, as far as the next fixed vertices', () => {
    const line = reshaped(level(21, 10), 10, [100, 130], (i) => i % 5 === 0);
    expect(line[10]).toEqual([100, 130]);
    // (1 + cos(π·d/50))/2 of 30 px at d = 10, 20, 30, 40 px.
    [27.135, 19.635, 10.365, 2.865].forEach((rise, k) => {
      expect(line[11 + k]![1]).toBeCloseTo(100 + rise, 3);
      expect(line[9 - k]![1]).toBeCloseTo(100 + rise, 3);
    });
    expect(line[5]).toEqual([50, 100]);
    expect(line[15]).toEqual([150, 100]);
    expect(line.filter(([, y]) => y !== 100)).toHaveLength(9);
  });

  it('moves one vertex alone where its neighbours are fixed, and none that is not there', () => {
    const line = level(5, 80);
    expect(reshaped(line, 2, [160, 90], () => true).filter(([, y]) => y !== 100)).toEqual([[160, 90]]);
    expect(reshaped(line, 9, [160, 90], () => true)).toEqual(line);
  });

  it('an end drags the line after it up to the next fixed vertex', () => {
    const line = reshaped(level(9, 10), 0, [0, 80], (i) => i === 4);
    expect(line[0]).toEqual([0, 80]);
    expect(line[2]![1]).toBeCloseTo(90, 6);
    expect(line[4]).toEqual([40, 100]);
  });
});

describe('the bends of a line whose clicks are not known', () => {
  it('are all its vertices where they lie far apart', () => {
    expect([...bendsOf(level(5, 80))]).toEqual([0, 1, 2, 3, 4]);
    expect([...bendsOf([])]).toEqual([]);
    expect([...bendsOf([[1, 1]])]).toEqual([0]);
  });

  it('of a smooth curve are few and far apart, and corners stay', () => {
    const clicks: Pair[] = [
      [100, 500],
      [200, 360],
      [330, 270],
      [480, 230],
    ];
    const curve = smoothCurve(clicks, 0.25);
    const bends = bendsOf(curve);
    expect(bends.size).toBeLessThan(curve.length / 2);
    const bent: Pair[] = [...level(6, 10), [50, 110], [50, 120], [50, 130]];
    expect(bendsOf(bent).has(5)).toBe(true);
  });
});
