import { distancesOf } from '#shared/compute/geometry/edit-lines/cut.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Ends nearer than this, in the unit of the points, are one place. */
const SAME_PLACE = 0.01;
/** However short the shorter line is, so wide a gap in its unit may always be closed. */
const ALWAYS_NEAR = 24;

/** Two lines joined: the points in the direction of the first, the ends that were joined, and how far apart they were. */
export type Joined = {
  readonly points: readonly Pair[];
  readonly bridge: readonly [Pair, Pair];
  readonly gap: number;
};

/** The points of a line the other way round. */
export function reversed<T extends Pair>(points: readonly T[]): T[] {
  return [...points].reverse();
}

/**
 * Joins two lines at their nearest ends, one frame; the second is turned round where that needs it. Ends at one place
 * become one vertex. Null when either has fewer than two points.
 */
export function joined(first: readonly Pair[], second: readonly Pair[]): Joined | null {
  if (first.length < 2 || second.length < 2) return null;
  const turned = reversed(second);
  const ways: Array<readonly [readonly Pair[], readonly Pair[]]> = [
    [first, second],
    [first, turned],
    [second, first],
    [turned, first],
  ];
  let best: Joined | null = null;
  for (const [a, b] of ways) {
    const bridge = [a.at(-1)!, b[0]!] as const;
    const gap = Math.hypot(bridge[1][0] - bridge[0][0], bridge[1][1] - bridge[0][1]);
    if (best === null || gap < best.gap) {
      best = { points: [...a, ...(gap <= SAME_PLACE ? b.slice(1) : b)], bridge, gap };
    }
  }
  return best;
}

/** The widest gap over which two lines are joined: the length of the shorter one, and never less than 24. */
export function widestGap(first: readonly Pair[], second: readonly Pair[]): number {
  const length = (points: readonly Pair[]) => distancesOf(points).at(-1) ?? 0;
  return Math.max(ALWAYS_NEAR, Math.min(length(first), length(second)));
}
