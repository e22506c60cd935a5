import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { nearestOnPolyline, type Polyline, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import { cheapestFirst } from '#shared/compute/net/cheapest-first.ts';
import { type Effort, seesPlace } from '#shared/compute/net/sight.ts';

/**
 * The shortest way to a line: its length, the corners that it bends round in order, and where on the line it arrives
 * (distance along it).
 */
export type WayToLine = { readonly length: number; readonly s: number; readonly corners: readonly Pair[] };

/**
 * Vertices that may be looked at for one way, so that no maze of walls takes longer than a moment: some thousand looks
 * past walls of the usual number of vertices, where the ways of a net take some dozens.
 */
const MOST_EFFORT = 300_000;
/** Putting a step in its place in the queue takes as long as looking at so many vertices. */
const STEP_EFFORT = 5;

/**
 * The shortest way from a place to a line that crosses no wall: straight where the line can be seen, else bent round
 * the corners of the walls. One frame, `slack` as in `seesPlace`. Null when every way is walled off, and when the walls
 * are such a maze that the shortest cannot be told within `effort`. Shortest paths by visibility graph (Lozano-Pérez and
 * Wesley 1979), searched by A* (Hart, Nilsson and Raphael 1968); whether two corners see one another is asked only when
 * the way between them comes first.
 */
export function wayToLine(
  from: Pair,
  goal: Polyline,
  walls: readonly Polyline[],
  slack: number,
  effort: Effort = { left: MOST_EFFORT },
): WayToLine | null {
  const near = nearestOnPolyline(goal, from[0], from[1]);
  if (seesPlace(from, near.at, walls, slack, effort))
    return { length: near.distance, s: near.s, corners: [] };
  return wayRoundCorners(from, goal, walls, slack, effort);
}

/** `rest`: what is left to the goal at least, the distance from its box. */
type Corner = { at: Pair; rest: number; reached: boolean };
type Step = { from: Pair; to: Corner; length: number; cost: number; before: readonly Pair[] };

function wayRoundCorners(
  from: Pair,
  goal: Polyline,
  walls: readonly Polyline[],
  slack: number,
  effort: Effort,
): WayToLine | null {
  const corners = walls.flatMap((wall) =>
    cornersOf(wall, slack).map((at): Corner => ({ at, rest: distanceToBox(at, goal), reached: false })),
  );
  const steps = cheapestFirst<Step>();
  let best: WayToLine | null = null;
  const bestLength = () => best?.length ?? Number.POSITIVE_INFINITY;
  const goOnFrom = (at: Pair, length: number, round: readonly Pair[]) => {
    const arrival = nearestSeen(at, goal, walls, slack, bestLength() - length, effort);
    if (arrival !== null) best = { length: length + arrival.length, s: arrival.s, corners: round };
    effort.left -= STEP_EFFORT * corners.length;
    for (const to of corners) {
      if (to.reached) continue;
      const onward = length + lengthOfVector(to.at[0] - at[0], to.at[1] - at[1]);
      if (onward + to.rest < bestLength())
        steps.push({ from: at, to, length: onward, cost: onward + to.rest, before: round });
    }
  };
  goOnFrom(from, 0, []);
  for (let step = steps.pop(); step !== null && step.cost < bestLength(); step = steps.pop()) {
    if (effort.left < 0) return null;
    if (step.to.reached || !seesPlace(step.from, step.to.at, walls, slack, effort)) continue;
    step.to.reached = true;
    goOnFrom(step.to.at, step.length, [...step.before, step.to.at]);
  }
  return effort.left < 0 ? null : best;
}

/** The corners of each wall, kept as long as the wall is: every point of a net asks for them. */
const cornersKept = new WeakMap<Polyline, { readonly slack: number; readonly corners: readonly Pair[] }>();

function cornersOf(wall: Polyline, slack: number): readonly Pair[] {
  const kept = cornersKept.get(wall);
  if (kept?.slack === slack) return kept.corners;
  const corners = thinned(verticesOf(wall), slack);
  cornersKept.set(wall, { slack, corners });
  return corners;
}

function distanceToBox([x, y]: Pair, { box }: Polyline): number {
  return lengthOfVector(Math.max(box.minX - x, 0, x - box.maxX), Math.max(box.minY - y, 0, y - box.maxY));
}

type Arrival = { readonly length: number; readonly s: number };

/** The nearest place on the goal in straight sight, among its nearest place and its vertices. */
function nearestSeen(
  from: Pair,
  goal: Polyline,
  walls: readonly Polyline[],
  slack: number,
  limit: number,
  effort: Effort,
): Arrival | null {
  const near = nearestOnPolyline(goal, from[0], from[1]);
  if (near.distance >= limit) return null;
  if (seesPlace(from, near.at, walls, slack, effort)) return { length: near.distance, s: near.s };
  const vertices = verticesOf(goal)
    .map((at, i) => ({ at, s: goal.cum[i]!, length: lengthOfVector(at[0] - from[0], at[1] - from[1]) }))
    .filter((vertex) => vertex.length < limit)
    .sort((a, b) => a.length - b.length);
  const seen = vertices.find(
    (vertex) => effort.left >= 0 && seesPlace(from, vertex.at, walls, slack, effort),
  );
  return seen ? { length: seen.length, s: seen.s } : null;
}
