import { describe, expect, it } from 'vitest';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { wayToLine } from '#shared/compute/net/shortest-way.ts';

const line = (...points: Pair[]) => polylineOf(points)!;
const goal = line([0, -100], [0, 100]);

describe('the shortest way to a line', () => {
  it('is the straight one where the line can be seen', () => {
    const way = wayToLine([30, 10], goal, [], 1);
    expect(way?.length).toBe(30);
    expect(way?.s).toBeCloseTo(110, 9);
  });

  it('bends round the nearer end of a wall, and round every wall on its way', () => {
    const wall = line([20, -40], [20, 30]);
    // From (40, 0) to the wall's end (20, 30), then square to the line (Pythagoras).
    expect(wayToLine([40, 0], goal, [wall], 1)?.length).toBeCloseTo(Math.hypot(20, 30) + 20, 9);
    const second = line([10, 20], [10, 400]);
    // From there the second wall's end (10, 20) has to be passed as well.
    const round = Math.hypot(20, 30) + Math.hypot(10, 10) + 10;
    const way = wayToLine([40, 0], goal, [wall, second], 1);
    expect(way?.length).toBeCloseTo(round, 9);
    expect(way?.corners).toEqual([
      [20, 30],
      [10, 20],
    ]);
  });

  it('takes little effort past an ordinary wall, and in a maze is given up before it takes much', () => {
    const ordinary = { left: 300_000 };
    wayToLine([40, 0], goal, [line([20, -40], [20, 30])], 1, ordinary);
    expect(300_000 - ordinary.left).toBeLessThan(100);
    const maze = Array.from({ length: 40 }, (_, k) =>
      line(
        ...Array.from(
          { length: 100 },
          (_, i): Pair => [20 + 20 * k + (i % 2 === 0 ? 0 : 19), -3000 + 60 * i],
        ),
      ),
    );
    const effort = { left: 300_000 };
    expect(wayToLine([1000, 0], goal, maze, 1, effort)).toBeNull();
    // No more is spent after it is used up than on a single look at each wall, and on the steps from one corner.
    expect(effort.left).toBeLessThan(0);
    expect(effort.left).toBeGreaterThan(-30_000);
  });
});
