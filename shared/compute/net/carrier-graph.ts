import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import {
  firstOf,
  lastOf,
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { cheapestFirst } from '#shared/compute/net/cheapest-first.ts';
import type { Carrier } from '#shared/compute/net/feet.ts';

/** A place where a carrier meets another line: a carrier, or a potential boundary (which ends the way). */
type Touch = {
  readonly carrier: string;
  readonly s: number;
  readonly other: string;
  readonly t: number;
  /** How far the two lines are apart there: 0 where they cross. */
  readonly gap: number;
};

/** The carriers of a net, where they meet each other, and where they meet the potential boundaries. */
export type CarrierGraph = {
  readonly carriers: ReadonlyMap<string, Carrier>;
  /** The touches on each carrier, in order along it. */
  readonly along: ReadonlyMap<string, readonly Touch[]>;
  /** A touch of two carriers as the other one has it. */
  readonly twins: ReadonlyMap<Touch, Touch>;
};

/** The part of a way that runs along one carrier. */
export type CarrierStretch = { readonly carrier: Carrier; readonly points: Pair[] };

/** A way along carriers: its points in order, carrier by carrier too, its length, and where it ends on the goal. */
export type CarrierWay = {
  readonly points: Pair[];
  readonly stretches: readonly CarrierStretch[];
  readonly length: number;
  readonly endS: number;
};

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
  const twins = new Map<Touch, Touch>();
  carriers.forEach((carrier, i) => {
    for (const other of carriers.slice(i + 1)) {
      for (const [s, t, gap] of meetings(carrier.shape, other.shape, reach)) {
        const touch = { carrier: carrier.id, s, other: other.id, t, gap };
        const twin = { carrier: other.id, s: t, other: carrier.id, t: s, gap };
        touches.push(touch, twin);
        twins.set(touch, twin).set(twin, touch);
      }
    }
    for (const potential of potentials) {
      if (potential.id === carrier.id) continue;
      for (const [s, t, gap] of meetings(carrier.shape, potential.shape, reach)) {
        touches.push({ carrier: carrier.id, s, other: potential.id, t, gap });
      }
    }
  });
  const along = new Map(carriers.map(({ id }): [string, Touch[]] => [id, []]));
  for (const touch of touches.sort((a, b) => a.s - b.s)) along.get(touch.carrier)!.push(touch);
  return { carriers: new Map(carriers.map((carrier) => [carrier.id, carrier])), along, twins };
}

type Meeting = readonly [s: number, t: number, gap: number];

function meetings(first: Polyline, second: Polyline, reach: number): Meeting[] {
  const found: Meeting[] = crossingsOf(first, second).map(({ s, t }) => [s, t, 0] as const);
  const addEnd = (s: number, t: number, gap: number) => {
    if (!found.some((place) => Math.abs(place[0] - s) <= reach && Math.abs(place[1] - t) <= reach))
      found.push([s, t, gap]);
  };
  for (const [end, s] of [[firstOf(first), 0] as const, [lastOf(first), lengthOf(first)] as const]) {
    const place = nearestOnPolyline(second, end[0], end[1]);
    if (place.distance <= reach) addEnd(s, place.s, place.distance);
  }
  for (const [end, t] of [[firstOf(second), 0] as const, [lastOf(second), lengthOf(second)] as const]) {
    const place = nearestOnPolyline(first, end[0], end[1]);
    if (place.distance <= reach) addEnd(place.s, t, place.distance);
  }
  return found;
}

/**
 * The shortest way along carriers from a place on one to a goal: a place on a carrier, or anywhere on a potential
 * boundary. Null when the carriers do not lead there or the way is longer than `limit` (pixels). Dijkstra's algorithm
 * (1959) from touch to touch; along a carrier only the next touch on either side is asked, so that the work grows with
 * the touches and not with their pairs.
 */
export function wayAlong(
  graph: CarrierGraph,
  from: { readonly carrier: string; readonly s: number },
  goal: { readonly line: string; readonly s: number | null },
  limit: number,
): CarrierWay | null {
  const open = cheapestFirst<Stop>();
  const done = new Set<Touch>();
  let best = null as Arrival | null;
  const arrive = (stop: Stop, s: number, endS: number) => {
    const cost = stop.cost + lengthBetween(graph.carriers.get(stop.carrier)!.shape, stop.s, s);
    if (cost <= limit && (best === null || cost < best.cost)) {
      best = { stop: { carrier: stop.carrier, s, cost, before: stop, touch: null }, cost, endS };
    }
  };
  open.push({ carrier: from.carrier, s: from.s, cost: 0, before: null, touch: null });
  for (let here = open.pop(); here !== null; here = open.pop()) {
    if (here.cost > Math.min(limit, best?.cost ?? limit)) break;
    if (here.touch !== null && done.has(here.touch)) continue;
    if (here.touch !== null) done.add(here.touch);
    const carrier = graph.carriers.get(here.carrier);
    if (carrier === undefined) continue;
    if (goal.line === here.carrier) arrive(here, goal.s ?? here.s, goal.s ?? here.s);
    if (here.touch !== null && here.touch.other === goal.line && goal.s === null) {
      arrive(here, here.s, here.touch.t);
    }
    for (const stop of onwardFrom(here, carrier, graph)) if (!done.has(stop.touch!)) open.push(stop);
  }
  return best === null ? null : wayTo(best, graph);
}

/** A place reached on a carrier, `touch` when it is one, with the length so far and the stop before. */
type Stop = {
  readonly carrier: string;
  readonly s: number;
  readonly cost: number;
  readonly before: Stop | null;
  readonly touch: Touch | null;
};

/** The end of a way: the last stop, the length to it, and where on the goal it is. */
type Arrival = { readonly stop: Stop; readonly cost: number; readonly endS: number };

/** The next touches along the carrier on both sides, and the other carrier where the stop is a touch. */
function onwardFrom(here: Stop, { shape, id }: Carrier, graph: CarrierGraph): Stop[] {
  const along = graph.along.get(id) ?? [];
  const at =
    here.touch === null ? firstFrom(along, here.s) : along.indexOf(here.touch, firstFrom(along, here.s));
  const sides = here.touch === null ? [at - 1, at] : [at - 1, at + 1];
  const closed = isClosed(shape);
  const stops: Stop[] = [];
  for (const side of sides) {
    const touch = along[closed ? (side + along.length) % along.length : side];
    if (touch === undefined || touch === here.touch) continue;
    const cost = here.cost + lengthBetween(shape, here.s, touch.s);
    stops.push({ carrier: id, s: touch.s, cost, before: here, touch });
  }
  const twin = here.touch === null ? undefined : graph.twins.get(here.touch);
  // A gap is as long as it is: else a way would leap from line to line rather than go on along its own.
  if (twin) {
    stops.push({
      carrier: twin.carrier,
      s: twin.s,
      cost: here.cost + twin.gap,
      before: here,
      touch: twin,
    });
  }
  return stops;
}

/** The first of the touches along a carrier at or after a distance along it. */
function firstFrom(along: readonly Touch[], s: number): number {
  let low = 0;
  let high = along.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (along[middle]!.s < s) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The points of the way: one piece of each carrier from where it is entered to where it is left. */
function wayTo({ stop, cost, endS }: Arrival, graph: CarrierGraph): CarrierWay {
  const stretches: CarrierStretch[] = [];
  let end = stop;
  for (let at: Stop | null = stop; at !== null; at = at.before) {
    if (at.before !== null && at.before.carrier === end.carrier) continue;
    const carrier = graph.carriers.get(end.carrier)!;
    stretches.push({ carrier, points: pieceAlong(carrier.shape, at.s, end.s) });
    if (at.before !== null) end = at.before;
  }
  stretches.reverse();
  return { points: stretches.flatMap(({ points }) => points), stretches, length: cost, endS };
}

function isClosed(shape: Polyline): boolean {
  const first = firstOf(shape);
  const last = lastOf(shape);
  return lengthOfVector(first[0] - last[0], first[1] - last[1]) <= 1e-3 * lengthOf(shape);
}

/** Length along a carrier between two places; on a closed outline the shorter way round. */
function lengthBetween(shape: Polyline, from: number, to: number): number {
  const direct = Math.abs(to - from);
  return isClosed(shape) ? Math.min(direct, lengthOf(shape) - direct) : direct;
}

/** The piece of a carrier between two places; on a closed outline the shorter way round. */
function pieceAlong(shape: Polyline, from: number, to: number): Pair[] {
  const whole = lengthOf(shape);
  if (!isClosed(shape) || Math.abs(to - from) <= whole / 2) return pieceOf(shape, from, to);
  return to > from
    ? [...pieceOf(shape, from, 0), ...pieceOf(shape, whole, to)]
    : [...pieceOf(shape, from, whole), ...pieceOf(shape, 0, to)];
}
