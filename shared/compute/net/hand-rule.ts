import { distanceToRing, ringContains } from '#shared/compute/geometry/polygon.ts';
import { distanceToPolyline, type Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { wayToLine } from '#shared/compute/net/shortest-way.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** Where a place lies between two neighbouring head lines. */
export type HandReading = {
  readonly strip: Strip;
  /** Part of the interval passed, 0 at the line before, 1 at the line after. */
  readonly fraction: number;
  /** Distances along the shortest ways, pixels. */
  readonly toBefore: number;
  readonly toAfter: number;
  /** Where the ways arrive, distance along the strip's `beforeShape` and `afterShape`. */
  readonly beforeS: number;
  readonly afterS: number;
  /** Corners of walls that the ways bend round, from the place on. */
  readonly beforeCorners: readonly Pair[];
  readonly afterCorners: readonly Pair[];
};

/**
 * The strip in which a place lies: the one whose outline holds it, or the nearest whose outline passes within `slack`
 * (a point on the base of a structure lies on the traced line only as exactly as it was traced). Null outside all, and
 * well inside two that overlap: then the lines contradict each other, and no figure is better than the first one.
 */
export function stripAt(strips: readonly Strip[], at: Pair, slack: number): Strip | null {
  const holding = strips.filter((strip) => ringContains(strip.ring, at[0], at[1]));
  const wellInside = holding.filter((strip) => distanceToRing(strip.ring, at[0], at[1]) > slack);
  if (wellInside.length > 1) return null;
  const only = wellInside[0] ?? holding[0];
  if (only) return only;
  let best: Strip | null = null;
  let nearest = slack;
  for (const strip of strips) {
    const { box } = strip.ring;
    if (at[0] < box.minX - slack || at[0] > box.maxX + slack) continue;
    if (at[1] < box.minY - slack || at[1] > box.maxY + slack) continue;
    const distance = distanceToRing(strip.ring, at[0], at[1]);
    if (distance <= nearest) {
      nearest = distance;
      best = strip;
    }
  }
  return best;
}

/**
 * True when a place lies so near a thin wall that its side hangs on the tremor of the tracing: within `slack` of a wall
 * and of two strips that have no line in common, as on the two faces of a sheet pile. Base-raster pixels.
 */
export function straddlesWall(
  strips: readonly Strip[],
  read: Strip,
  at: Pair,
  walls: readonly Polyline[],
  slack: number,
): boolean {
  if (!walls.some((wall) => distanceToPolyline(wall, at[0], at[1]) <= slack)) return false;
  const lines = [read.before, read.after];
  return strips.some(
    ({ before, after, ring }) =>
      !lines.includes(before) && !lines.includes(after) && distanceToRing(ring, at[0], at[1]) <= slack,
  );
}

/**
 * Reads a place by hand's rule: the ratio of the shortest ways to the two neighbouring lines that cross no wall and
 * neither line. `at` and `slack` in base-raster pixels. Null when a wall cuts the place off from one of the lines.
 * Source: the usual reading of a flow net by eye, done with the shortest ways.
 */
export function readByHand(
  strip: Strip,
  at: Pair,
  walls: readonly Polyline[],
  slack: number,
): HandReading | null {
  const before = wayToLine(at, strip.beforeShape, [...walls, strip.afterShape], slack);
  const after = wayToLine(at, strip.afterShape, [...walls, strip.beforeShape], slack);
  if (before === null || after === null) return null;
  const whole = before.length + after.length;
  return {
    strip,
    fraction: whole > 0 ? before.length / whole : 0,
    toBefore: before.length,
    toAfter: after.length,
    beforeS: before.s,
    afterS: after.s,
    beforeCorners: before.corners,
    afterCorners: after.corners,
  };
}
