import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  firstOf,
  lastOf,
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Carrier } from '#shared/compute/net/feet.ts';

/** A place where a carrier meets another line: a carrier, or a potential boundary (which ends the way). */
type Touch = { readonly carrier: string; readonly s: number; readonly other: string; readonly t: number };

/** The carriers of a net, where they meet each other, and where they meet the potential boundaries. */
export type CarrierGraph = {
  readonly carriers: ReadonlyMap<string, Carrier>;
  readonly touches: readonly Touch[];
};

/** A way along carriers: its points in order, its length, and where it ends on the goal. */
export type CarrierWay = { readonly points: Pair[]; readonly length: number; readonly endS: number };

/**
 * Finds where carriers meet one another and the potential boundaries: crossings, and ends within `reach`. Shapes and
 * `reach` in base-raster pixels.
 */
export function carrierGraph(
  carriers: readonly Carrier[],
  potentials: ReadonlyArray<{ readonly id: string; readonly shape: Polyline }>,
  reach: number,
): CarrierGraph {
  const touches: Touch[] = [];
  carriers.forEach((carrier, i) => {
    for (const other of carriers.slice(i + 1)) {
      for (const [s, t] of meetings(carrier.shape, other.shape, reach)) {
        touches.push(
          { carrier: carrier.id, s, other: other.id, t },
          { carrier: other.id, s: t, other: carrier.id, t: s },
        );
      }
    }
    for (const potential of potentials) {
      if (potential.id === carrier.id) continue;
      for (const [s, t] of meetings(carrier.shape, potential.shape, reach)) {
        touches.push({ carrier: carrier.id, s, other: potential.id, t });
      }
    }
  });
  return { carriers: new Map(carriers.map((carrier) => [carrier.id, carrier])), touches };
}

function meetings(first: Polyline, second: Polyline, reach: number): Array<readonly [s: number, t: number]> {
  const found: Array<readonly [number, number]> = crossingsOf(first, second).map(
    ({ s, t }) => [s, t] as const,
  );
  const addEnd = (s: number, t: number) => {
    if (!found.some((place) => Math.abs(place[0] - s) <= reach && Math.abs(place[1] - t) <= reach))
      found.push([s, t]);
  };
  for (const [end, s] of [[firstOf(first), 0] as const, [lastOf(first), lengthOf(first)] as const]) {
    const place = nearestOnPolyline(second, end[0], end[1]);
    if (place.distance <= reach) addEnd(s, place.s);
  }
  for (const [end, t] of [[firstOf(second), 0] as const, [lastOf(second), lengthOf(second)] as const]) {
    const place = nearestOnPolyline(first, end[0], end[1]);
    if (place.distance <= reach) addEnd(place.s, t);
  }
  return found;
}

/**
 * The shortest way along carriers from a place on one to a goal: a place on a carrier, or anywhere on a potential
 * boundary. Null when the carriers do not lead there or the way is longer than `limit` (pixels).
 */
export function wayAlong(
  graph: CarrierGraph,
  from: { readonly carrier: string; readonly s: number },
  goal: { readonly line: string; readonly s: number | null },
  limit: number,
): CarrierWay | null {
  type State = { carrier: string; s: number; length: number; points: Pair[] };
  const open: State[] = [{ carrier: from.carrier, s: from.s, length: 0, points: [] }];
  const done = new Set<string>();
  let best: CarrierWay | null = null;
  while (open.length > 0) {
    open.sort((a, b) => b.length - a.length);
    const here = open.pop()!;
    if (here.length > Math.min(limit, best?.length ?? limit)) break;
    const key = `${here.carrier}@${here.s}`;
    if (done.has(key)) continue;
    done.add(key);
    const carrier = graph.carriers.get(here.carrier);
    if (carrier === undefined) continue;
    const goals = goalsOn(graph, here, goal);
    for (const { s, endS } of goals) {
      const piece = pieceAlong(carrier.shape, here.s, s);
      const length = here.length + piece.length;
      if (length <= limit && (best === null || length < best.length)) {
        best = { points: [...here.points, ...piece.points], length, endS };
      }
    }
    for (const touch of graph.touches) {
      if (touch.carrier !== here.carrier || !graph.carriers.has(touch.other)) continue;
      const piece = pieceAlong(carrier.shape, here.s, touch.s);
      open.push({
        carrier: touch.other,
        s: touch.t,
        length: here.length + piece.length,
        points: [...here.points, ...piece.points],
      });
    }
  }
  return best;
}

function goalsOn(
  graph: CarrierGraph,
  here: { carrier: string; s: number },
  goal: { readonly line: string; readonly s: number | null },
): Array<{ s: number; endS: number }> {
  if (goal.s !== null) return goal.line === here.carrier ? [{ s: goal.s, endS: goal.s }] : [];
  // A boundary of free outflow carries feet itself: whoever stands on it has arrived.
  if (goal.line === here.carrier) return [{ s: here.s, endS: here.s }];
  return graph.touches
    .filter((touch) => touch.carrier === here.carrier && touch.other === goal.line)
    .map((touch) => ({ s: touch.s, endS: touch.t }));
}

/** The piece of a carrier between two places; on a closed outline the shorter way round. */
function pieceAlong(shape: Polyline, from: number, to: number): { points: Pair[]; length: number } {
  const whole = lengthOf(shape);
  const direct = Math.abs(to - from);
  const first = firstOf(shape);
  const last = lastOf(shape);
  const closed = Math.hypot(first[0] - last[0], first[1] - last[1]) <= 1e-3 * whole;
  if (!closed || direct <= whole / 2) return { points: pieceOf(shape, from, to), length: direct };
  const points =
    to > from
      ? [...pieceOf(shape, from, 0), ...pieceOf(shape, whole, to)]
      : [...pieceOf(shape, from, whole), ...pieceOf(shape, 0, to)];
  return { points, length: whole - direct };
}
