import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { type Ring, ringContains, ringOf } from '#shared/compute/geometry/polygon.ts';
import {
  firstOf,
  lastOf,
  lengthOf,
  type Polyline,
  pieceOf,
  pointAlong,
} from '#shared/compute/geometry/polyline.ts';

/**
 * Impervious outlines that are traced closed, such as a gallery or a footing: no water flows inside, so nothing is
 * read there, whatever ways lead round their corners. An outline that holds an equipotential is the border of the
 * flow and no body. Shapes and `reach`, the gap that still counts as closed, in base-raster pixels.
 */
export function solidBodies(
  walls: readonly Polyline[],
  equipotentials: readonly Polyline[],
  reach: number,
): Ring[] {
  return walls.flatMap((wall) => {
    const [start, end] = [firstOf(wall), lastOf(wall)];
    if (lengthOfVector(start[0] - end[0], start[1] - end[1]) > reach) return [];
    const ring = ringOf(pieceOf(wall, 0, lengthOf(wall)));
    if (ring === null) return [];
    const holdsFlow = equipotentials.some((line) =>
      ringContains(ring, ...pointAlong(line, lengthOf(line) / 2)),
    );
    return holdsFlow ? [] : [ring];
  });
}
