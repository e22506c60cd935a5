import { nearestOnPolyline, type Polyline, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import { seesPlace } from '#shared/compute/net/sight.ts';

/** The shortest way to a line: its length and where on the line it arrives (distance along it). */
export type WayToLine = { readonly length: number; readonly s: number };

/**
 * The shortest way from a place to a line that crosses no wall: straight where the line can be seen, else bent round
 * the corners of the walls. One frame, `slack` as in `seesPlace`. Null when every way is walled off. Shortest paths
 * by visibility graph (Lozano-Pérez and Wesley 1979) and Dijkstra's algorithm (1959).
 */
export function wayToLine(
  from: Pair,
  goal: Polyline,
  walls: readonly Polyline[],
  slack: number,
): WayToLine | null {
  const near = nearestOnPolyline(goal, from[0], from[1]);
  if (seesPlace(from, near.at, walls, slack)) return { length: near.distance, s: near.s };
  return wayRoundCorners(from, goal, walls, slack);
}

type Node = { at: Pair; length: number; done: boolean };

function wayRoundCorners(
  from: Pair,
  goal: Polyline,
  walls: readonly Polyline[],
  slack: number,
): WayToLine | null {
  const nodes: Node[] = [{ at: from, length: 0, done: false }];
  for (const wall of walls) {
    for (const at of thinned(verticesOf(wall), slack)) {
      nodes.push({ at, length: Number.POSITIVE_INFINITY, done: false });
    }
  }
  let best: WayToLine | null = null;
  for (;;) {
    const here = nextNode(nodes);
    if (here === null || here.length >= (best?.length ?? Number.POSITIVE_INFINITY)) return best;
    here.done = true;
    const arrival = nearestSeen(
      here.at,
      goal,
      walls,
      slack,
      (best?.length ?? Number.POSITIVE_INFINITY) - here.length,
    );
    if (arrival !== null) best = { length: here.length + arrival.length, s: arrival.s };
    for (const other of nodes) {
      const length = here.length + Math.hypot(other.at[0] - here.at[0], other.at[1] - here.at[1]);
      if (other.done || length >= Math.min(other.length, best?.length ?? Number.POSITIVE_INFINITY)) continue;
      if (seesPlace(here.at, other.at, walls, slack)) other.length = length;
    }
  }
}

function nextNode(nodes: readonly Node[]): Node | null {
  let next: Node | null = null;
  for (const node of nodes) {
    if (!node.done && Number.isFinite(node.length) && (next === null || node.length < next.length))
      next = node;
  }
  return next;
}

/** The nearest place on the goal in straight sight, among its nearest place and its vertices. */
function nearestSeen(
  from: Pair,
  goal: Polyline,
  walls: readonly Polyline[],
  slack: number,
  limit: number,
): WayToLine | null {
  const near = nearestOnPolyline(goal, from[0], from[1]);
  if (near.distance >= limit) return null;
  if (seesPlace(from, near.at, walls, slack)) return { length: near.distance, s: near.s };
  const vertices = verticesOf(goal)
    .map((at, i) => ({ at, s: goal.cum[i]!, length: Math.hypot(at[0] - from[0], at[1] - from[1]) }))
    .filter((vertex) => vertex.length < limit)
    .sort((a, b) => a.length - b.length);
  const seen = vertices.find((vertex) => seesPlace(from, vertex.at, walls, slack));
  return seen ? { length: seen.length, s: seen.s } : null;
}
