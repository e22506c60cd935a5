import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { selfCrossingOf } from '#shared/compute/geometry/self-crossing.ts';

const crossing = (points: Pair[], slack = 0) => selfCrossingOf(polylineOf(points)!, slack);

describe('a line that crosses itself', () => {
  it('is found, with the place and the distances at which the line passes it', () => {
    const loop: Pair[] = [
      [0, 0],
      [10, 0],
      [10, 5],
      [5, 5],
      [5, -5],
    ];
    expect(crossing(loop)).toEqual({ s: 5, t: 25, at: [5, 0] });
  });

  it('is found wherever the loop lies among many vertices', () => {
    fc.assert(
      fc.property(fc.integer({ min: 60, max: 900 }), (at) => {
        const wave = Array.from({ length: 1000 }, (_, i): Pair => [10 * i, 50 * Math.sin(i / 20)]);
        const [x, y] = wave[at]!;
        const loop: Pair[] = [
          [x + 4, y + 200],
          [x - 300, y + 200],
          [x - 300, y - 200],
          [x + 4, y - 200],
          [x + 4, y + 30],
        ];
        expect(crossing([...wave.slice(0, at + 1), ...loop, ...wave.slice(at + 1)], 4)).not.toBeNull();
        expect(crossing(wave, 4)).toBeNull();
      }),
      { numRuns: 50 },
    );
  });
});

describe('a line that only touches itself', () => {
  it('at its own start, as a closed outline does, does not cross itself', () => {
    const outline: Pair[] = [
      [0, 0],
      [10, 0],
      [10, 5],
      [0, 5],
      [0, 0],
    ];
    expect(crossing(outline)).toBeNull();
  });

  it('by running back along itself, as a thin wall is outlined, does not cross itself', () => {
    const wall: Pair[] = [
      [-10, 0],
      [0, 0],
      [0, 4],
      [0, 8],
      [0, 3],
      [0, 0],
      [10, 0],
    ];
    expect(crossing(wall)).toBeNull();
  });

  it('by the tremor of a hand that goes down one side of a thin wall and up the other, does not cross itself', () => {
    const down = Array.from({ length: 60 }, (_, i): Pair => [i % 2 === 0 ? 1.5 : -1.5, 10 * i]);
    const up = Array.from({ length: 60 }, (_, i): Pair => [i % 3 === 0 ? -1.5 : 1.5, 595 - 10 * i]);
    expect(crossing([...down, ...up], 0)).not.toBeNull();
    expect(crossing([...down, ...up], 6)).toBeNull();
  });
});

it('a line scribbled over itself within the tremor of the hand is told from a trembling one by its many crossings', () => {
  const scribble = Array.from({ length: 400 }, (_, i): Pair => [(i * 7919) % 100, (i * 104729) % 3]);
  expect(crossing(scribble, 1000)).not.toBeNull();
});
