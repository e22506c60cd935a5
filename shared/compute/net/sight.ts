import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import {
  boxesMeet,
  type Polyline,
  polylineOf,
  segmentAlong,
  vertexOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** How many more vertices of walls may be looked at; below 0 the looking is to be given up. */
export type Effort = { left: number };

/**
 * True when no wall stands between two places, one frame. Walls are traced by a trembling hand: a crossing within
 * `slack` of either place, and a bump that comes back within `slack` of the line of sight, do not count. Takes from
 * `effort` a unit for each wall, and one for each vertex of a wall that is near.
 */
export function seesPlace(
  from: Pair,
  to: Pair,
  walls: readonly Polyline[],
  slack: number,
  effort: Effort,
): boolean {
  const sight = polylineOf([from, to]);
  if (sight === null) return true;
  return walls.every((wall) => {
    const near = boxesMeet(wall.box, sight.box);
    effort.left -= near ? wall.cum.length : 1;
    return !near || !blocks(wall, sight, slack);
  });
}

function blocks(wall: Polyline, sight: Polyline, slack: number): boolean {
  const length = sight.cum[1]!;
  const met = crossingsOf(sight, wall)
    .filter((crossing) => crossing.s > slack && crossing.s < length - slack)
    .map((crossing) => crossing.t)
    .sort((a, b) => a - b);
  if (met.length === 0) return false;
  // An odd count leaves the two places on different sides of the wall.
  if (met.length % 2 === 1) return true;
  for (let i = 0; i + 1 < met.length; i += 2) {
    if (excursion(wall, met[i]!, met[i + 1]!, sight) > slack) return true;
  }
  return false;
}

/** How far the wall strays from the line of sight between two places along the wall. */
function excursion(wall: Polyline, from: number, to: number, sight: Polyline): number {
  const [ax, ay] = vertexOf(sight, 0);
  const [bx, by] = vertexOf(sight, 1);
  const length = lengthOfVector(bx - ax, by - ay);
  let farthest = 0;
  for (let i = segmentAlong(wall, from) + 1; i < wall.cum.length && wall.cum[i]! < to; i += 1) {
    const [x, y] = vertexOf(wall, i);
    farthest = Math.max(farthest, Math.abs((bx - ax) * (y - ay) - (by - ay) * (x - ax)) / length);
  }
  return farthest;
}
