import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { firstOf, lastOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';

/**
 * Where a potential boundary ends: mostly at the edge of something impervious, about which the gradient is endless. `gap`
 * is how far from one another the two traces end, short of one another or past: the edge may be anywhere between.
 * Working pixels.
 */
export type BoundaryEdge = { readonly at: Pair; readonly gap: number };

/** The ends of the potential boundaries of a net, each with the gap to the nearest end of a wall that the tracing bridges. */
export function boundaryEdges({ potentials, walls, reach }: NetModel): BoundaryEdge[] {
  const ends = walls.flatMap(({ shape }) => [firstOf(shape), lastOf(shape)]);
  return potentials
    .flatMap(({ shape }) => [firstOf(shape), lastOf(shape)])
    .map((at) => {
      const gaps = ends.map(([x, y]) => lengthOfVector(x - at[0], y - at[1])).filter((gap) => gap <= reach);
      return { at, gap: gaps.length === 0 ? 0 : Math.min(...gaps) };
    });
}
