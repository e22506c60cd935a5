import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { boxesMeet, type Polyline, polylineOf, vertexOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * True when no wall stands between two places, one frame. Walls are traced by a trembling hand: a crossing within
 * `slack` of either place, and a bump that comes back within `slack` of the line of sight, do not count.
 */
export function seesPlace(from: Pair, to: Pair, walls: readonly Polyline[], slack: number): boolean {
  const sight = polylineOf([from, to]);
  if (sight === null) return true;
  return walls.every((wall) => !blocks(wall, sight, slack));
}

function blocks(wall: Polyline, sight: Polyline, slack: number): boolean {
  if (!boxesMeet(wall.box, sight.box)) return false;
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
  const length = Math.hypot(bx - ax, by - ay);
  let farthest = 0;
  for (let i = 0; i < wall.cum.length; i += 1) {
    if (wall.cum[i]! <= from || wall.cum[i]! >= to) continue;
    const [x, y] = vertexOf(wall, i);
    farthest = Math.max(farthest, Math.abs((bx - ax) * (y - ay) - (by - ay) * (x - ax)) / length);
  }
  return farthest;
}
