import {
  nearestOnPolyline,
  type Polyline,
  pointAlong,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';

/** A wall stands this steeply or more; a flatter boundary is a floor. */
const STEEP = Math.tan((60 * Math.PI) / 180);
/** The foot of a thick wall is no wider than this part of its depth. */
const FOOT_PART = 0.5;

/** What a boundary is followed with: places in working pixels, `natural` carries them to offset and elevation. */
export type TipGround = {
  readonly others: readonly Polyline[];
  readonly accuracyPx: number;
  readonly reach: number;
  natural(place: Pair): Pair;
};

/**
 * The tip of a wall that enters the ground at distance `s` along a boundary: where the steep descent ends with water
 * passing below it, that is with a free end, or with the boundary turning up again after no more than the foot of a
 * thick wall. Null where the boundary does not go steeply down and where it leads on into the base of the layer, as the
 * side of a section does. Offset and elevation, length unit.
 */
export function wallTip(line: Polyline, s: number, ground: TipGround): Pair | null {
  const start = pointAlong(line, s);
  const vertices = verticesOf(line);
  const after = vertices.filter((_, i) => line.cum[i]! > s);
  const before = vertices.filter((_, i) => line.cum[i]! < s).reverse();
  const tips = [after, before]
    .map((way) => tipAlong(thinned([start, ...way], 3 * ground.accuracyPx), ground))
    .filter((tip) => tip !== null);
  return tips.sort((a, b) => a[1] - b[1])[0] ?? null;
}

function tipAlong(way: readonly Pair[], ground: TipGround): Pair | null {
  const path = way.map((place) => ground.natural(place));
  let k = 0;
  while (k + 1 < path.length && isSteep(path[k]!, path[k + 1]!) && path[k + 1]![1] < path[k]![1]) k += 1;
  if (k === 0) return null;
  const tip = path[k]!;
  const depth = path[0]![1] - tip[1];
  return turnsUp(path.slice(k), FOOT_PART * depth, () =>
    isFreeEnd(way[way.length - 1]!, FOOT_PART * depth, ground),
  )
    ? tip
    : null;
}

/** True when a path rises steeply after a flat foot no wider than `foot`; where it ends before, `atEnd` decides. */
function turnsUp(path: readonly Pair[], foot: number, atEnd: () => boolean): boolean {
  let flat = 0;
  for (let i = 1; i < path.length; i += 1) {
    const [from, to] = [path[i - 1]!, path[i]!];
    if (isSteep(from, to)) return to[1] > from[1];
    flat += Math.abs(to[0] - from[0]);
    if (flat > foot) return false;
  }
  return atEnd();
}

/** True when no other boundary is met at the end of a wall, or only its other face, which leads up. */
function isFreeEnd(end: Pair, foot: number, { others, accuracyPx, reach, natural }: TipGround): boolean {
  return others.every((other) => {
    const met = nearestOnPolyline(other, end[0], end[1]);
    if (met.distance > reach) return true;
    const vertices = verticesOf(other);
    const isLast = other.cum[other.cum.length - 1]! - met.s <= reach;
    if (!isLast && met.s > reach) return false;
    const way = thinned(isLast ? vertices.toReversed() : vertices, 3 * accuracyPx).map((place) =>
      natural(place),
    );
    return turnsUp(way, foot, () => false);
  });
}

function isSteep(from: Pair, to: Pair): boolean {
  return Math.abs(to[1] - from[1]) > STEEP * Math.abs(to[0] - from[0]);
}
