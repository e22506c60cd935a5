import { type Ring, ringContains, ringOf } from '#shared/compute/geometry/polygon.ts';
import {
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
  pointAlong,
  polylineOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { type CarrierGraph, type CarrierStretch, wayAlong } from '#shared/compute/net/carrier-graph.ts';
import type { Foot } from '#shared/compute/net/feet.ts';
import type { OrderedPair } from '#shared/compute/net/order.ts';

/** A head line ready to bound a strip: its shape from foot to foot; `fixed` is false for potential boundaries. */
export type StripLine = {
  readonly id: string;
  readonly shape: Polyline;
  readonly start: Foot | null;
  readonly end: Foot | null;
  /** A potential boundary bounds a strip only between the places where the carriers meet it. */
  readonly isBoundary: boolean;
  /** True when `shape` runs against the line as the carriers know it. */
  readonly isReversed?: boolean;
};

/** The ground between two neighbouring head lines, in base-raster pixels. */
export type Strip = {
  readonly before: string;
  readonly after: string;
  /** The parts of both lines that bound the strip; on a boundary, distances are counted from `beforeFrom`/`afterFrom`. */
  readonly beforeShape: Polyline;
  readonly afterShape: Polyline;
  readonly ring: Ring;
  /** How the two ends are closed, each from the line before to the line after, both lines' ends included. */
  readonly ways: ReadonlyArray<{ readonly points: readonly Pair[]; readonly open: boolean }>;
  /**
   * Parts of the ways along which a head is held: a boundary of its own head that the flow passes beside, or a further
   * equipotential where the flow parts; `way` is the one of `ways` that it belongs to. None in most strips.
   */
  readonly held: ReadonlyArray<{ readonly id: string; readonly shape: Polyline; readonly way: 0 | 1 }>;
};

/** The longest way along carriers that still closes a strip, in lengths of its longer line. */
const LONGEST_WAY = 4;

/** Parts of a line's length at which it is asked whether it lies in a strip. */
const PARTS_ASKED = [1, 2, 3, 4, 5, 6, 7].map((eighth) => eighth / 8);

/**
 * The strip between two neighbouring head lines: one line, the piece of boundary between the feet, the next line
 * backwards, and the other end. A way along the carriers closes an end; where none leads from line to line the
 * straight join does. A gap in a boundary can leave only a way round other head lines, which would give the strip
 * their ground: then both ends are joined straight. All in base-raster pixels. Null when the outline has no area or
 * still holds a line of `others`, so that nothing is read from it.
 */
export function stripBetween(
  before: StripLine,
  after: StripLine,
  pair: OrderedPair,
  graph: CarrierGraph,
  others: readonly StripLine[],
): Strip | null {
  const far = pair.sameDirection ? after : reversedLine(after);
  const limit = LONGEST_WAY * Math.max(lengthOf(before.shape), lengthOf(far.shape));
  for (const longest of [limit, 0]) {
    const strip = outlined(before, far, graph, longest);
    if (strip && !others.some((line) => holdsPartOf(strip.ring, line.shape))) return strip;
  }
  return null;
}

/** True when a line runs in an outline. Asked between the ends only: a foot may reach a tracing error's width into the ground beside it. */
export function holdsPartOf(ring: Ring, shape: Polyline): boolean {
  const length = lengthOf(shape);
  return PARTS_ASKED.some((part) => ringContains(ring, ...pointAlong(shape, part * length)));
}

function outlined(before: StripLine, far: StripLine, graph: CarrierGraph, limit: number): Strip | null {
  const start = closingWay(before, far, 'start', graph, limit);
  const end = closingWay(before, far, 'end', graph, limit);
  const beforeShape = bounded(before, start.beforeS, end.beforeS);
  const afterShape = bounded(far, start.afterS, end.afterS);
  const ring = ringOf([
    ...pointsOf(beforeShape),
    ...end.points,
    ...pointsOf(afterShape).reverse(),
    ...[...start.points].reverse(),
  ]);
  if (ring === null) return null;
  const between = (closing: Closing, sBefore: number, sAfter: number) => ({
    points: [pointAlong(beforeShape, sBefore), ...closing.points, pointAlong(afterShape, sAfter)],
    open: closing.open,
  });
  const ways = [between(start, 0, 0), between(end, lengthOf(beforeShape), lengthOf(afterShape))];
  const held = [start, end].flatMap(({ stretches }, i) =>
    stretches.flatMap(({ carrier, points }) => {
      const shape = carrier.held === 'atOneHead' ? polylineOf(points) : null;
      return shape === null ? [] : [{ id: carrier.id, shape, way: i === 0 ? (0 as const) : (1 as const) }];
    }),
  );
  return { before: before.id, after: far.id, beforeShape, afterShape, ring, ways, held };
}

function reversedLine(line: StripLine): StripLine {
  const shape = polylineOf(pointsOf(line.shape).reverse()) ?? line.shape;
  return { ...line, shape, start: line.end, end: line.start, isReversed: true };
}

function pointsOf(shape: Polyline): Pair[] {
  return pieceOf(shape, 0, lengthOf(shape));
}

/** How one end is closed: points from `before` to `after`, and where on each line it begins and ends. */
type Closing = {
  points: Pair[];
  stretches: readonly CarrierStretch[];
  beforeS: number | null;
  afterS: number | null;
  open: boolean;
};

function closingWay(
  before: StripLine,
  after: StripLine,
  end: 'start' | 'end',
  graph: CarrierGraph,
  limit: number,
): Closing {
  const footBefore = before.isBoundary ? null : before[end];
  const footAfter = after.isBoundary ? null : after[end];
  if (footBefore && footAfter) {
    const way = wayAlong(
      graph,
      { carrier: footBefore.carrier.id, s: footBefore.s },
      { line: footAfter.carrier.id, s: footAfter.s },
      limit,
    );
    if (way)
      return { points: way.points, stretches: way.stretches, beforeS: null, afterS: null, open: false };
  }
  if (footAfter && before.isBoundary) {
    const way = wayAlong(
      graph,
      { carrier: footAfter.carrier.id, s: footAfter.s },
      { line: before.id, s: null },
      limit,
    );
    if (way) {
      const { points, stretches, endS } = way;
      return { points: points.reverse(), stretches, beforeS: endS, afterS: null, open: false };
    }
  }
  if (footBefore && after.isBoundary) {
    const way = wayAlong(
      graph,
      { carrier: footBefore.carrier.id, s: footBefore.s },
      { line: after.id, s: null },
      limit,
    );
    const along = (s: number) => (after.isReversed ? lengthOf(after.shape) - s : s);
    if (way) {
      const { points, stretches, endS } = way;
      return { points, stretches, beforeS: null, afterS: along(endS), open: false };
    }
  }
  return straightJoin(before, after, end);
}

function straightJoin(before: StripLine, after: StripLine, end: 'start' | 'end'): Closing {
  const endOf = (line: StripLine) => pointAlong(line.shape, end === 'start' ? 0 : lengthOf(line.shape));
  const nearestOn = (line: StripLine, other: StripLine) =>
    line.isBoundary && !other.isBoundary ? nearestOnPolyline(line.shape, ...endOf(other)).s : null;
  return {
    points: [],
    stretches: [],
    beforeS: nearestOn(before, after),
    afterS: nearestOn(after, before),
    open: true,
  };
}

/** The part of a boundary between the two closings; all of it when they do not leave a piece in the right order. */
function bounded(line: StripLine, from: number | null, to: number | null): Polyline {
  const start = from ?? 0;
  const end = to ?? lengthOf(line.shape);
  if (!(end > start)) return line.shape;
  return polylineOf(pieceOf(line.shape, start, end)) ?? line.shape;
}
