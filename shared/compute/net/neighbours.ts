import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { lengthOf, type Polyline, pointAlong } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { castRay } from '#shared/compute/net/ray.ts';

/** A line that carries a head: an equipotential, or a potential boundary with its role. */
export type HeadLine = {
  readonly id: string;
  readonly shape: Polyline;
  readonly role: 'equipotential' | 'headwater' | 'outlet';
  /** True where the head is the elevation and varies along the line. */
  readonly varies: boolean;
};

/** Side of a line: 0 is the left hand in the direction of its points as seen on the sheet, 1 the right hand. */
export type Side = 0 | 1;

/** What is seen from one side of a line: how often each other line, and how places on the two go together. */
type Seen = { count: number; pairs: Array<readonly [own: number, other: number]> };
export type Sightings = Map<string, readonly [Map<string, Seen>, Map<string, Seen>]>;

/** Neighbouring lines with nothing between them, and the sides by which they face one another. */
export type NeighbourLink = {
  readonly a: string;
  readonly sideA: Side;
  readonly b: string;
  readonly sideB: Side;
  /** True when both lines are drawn in the same direction across the flow. */
  readonly sameDirection: boolean;
};

const RAYS = 15;
/** A flow line that leads from one line to the next says as much as this many rays. */
const FLOW_LINE_VOTES = 4;
/** The least share of a side's sightings for a line that itself sees this one foremost. */
const LEAST_SHARE = 0.25;

/**
 * Finds which head lines are neighbours along the flow. From places along each line a ray goes out square to it, as
 * the flow does, to the first thing it meets; walls stop it. The line met most often on a side is the neighbour
 * there; traced flow lines add what they connect. All shapes in base-raster pixels. The answer does not depend on the
 * order or direction of the lines. Own derivation.
 */
export function neighbourLinks(
  heads: readonly HeadLine[],
  walls: readonly Polyline[],
  flowLines: readonly Polyline[],
): NeighbourLink[] {
  const sightings: Sightings = new Map(heads.map((line) => [line.id, [new Map(), new Map()] as const]));
  for (const line of heads) lookAround(line, heads, walls, sightings);
  for (const flowLine of flowLines) followFlowLine(flowLine, heads, sightings);
  return linksFrom(heads, sightings);
}

function lookAround(
  line: HeadLine,
  heads: readonly HeadLine[],
  walls: readonly Polyline[],
  sightings: Sightings,
) {
  const length = lengthOf(line.shape);
  for (let k = 0; k < RAYS; k += 1) {
    const s = ((k + 0.5) / RAYS) * length;
    const at = pointAlong(line.shape, s);
    const along = directionAt(line.shape, s);
    for (const side of [0, 1] as const) {
      const direction: Pair = side === 0 ? [along[1], -along[0]] : [-along[1], along[0]];
      const hit = castRay(at, direction, line, heads, walls);
      if (hit === null || !canFlow(line, hit.line)) continue;
      note(sightings, line.id, side, hit.line.id, s, hit.s, 1);
    }
  }
}

/** Direction of a line about a place, over a tenth of its length, so that the hand's tremor does not turn it. */
function directionAt(shape: Polyline, s: number): Pair {
  const reach = 0.05 * lengthOf(shape);
  const a = pointAlong(shape, s - reach);
  const b = pointAlong(shape, s + reach);
  const size = lengthOfVector(b[0] - a[0], b[1] - a[1]);
  return size > 0 ? [(b[0] - a[0]) / size, (b[1] - a[1]) / size] : [1, 0];
}

/** No water runs between two boundaries of the same role. */
function canFlow(a: HeadLine, b: HeadLine): boolean {
  return a.role === 'equipotential' || a.role !== b.role;
}

function note(
  sightings: Sightings,
  from: string,
  side: Side,
  to: string,
  own: number,
  other: number,
  count: number,
): void {
  const bySide = sightings.get(from)![side];
  const seen = bySide.get(to) ?? { count: 0, pairs: [] };
  seen.count += count;
  seen.pairs.push([own, other]);
  bySide.set(to, seen);
}

function followFlowLine(flowLine: Polyline, heads: readonly HeadLine[], sightings: Sightings): void {
  const met = heads
    .flatMap((line) => crossingsOf(flowLine, line.shape).map((crossing) => ({ line, ...crossing })))
    .sort((a, b) => a.s - b.s);
  for (let i = 0; i + 1 < met.length; i += 1) {
    const here = met[i]!;
    const next = met[i + 1]!;
    if (here.line.id === next.line.id || !canFlow(here.line, next.line)) continue;
    const middle = pointAlong(flowLine, (here.s + next.s) / 2);
    const sideHere = sideOf(here.line.shape, here.t, here.at, middle);
    const sideNext = sideOf(next.line.shape, next.t, next.at, middle);
    note(sightings, here.line.id, sideHere, next.line.id, here.t, next.t, FLOW_LINE_VOTES);
    note(sightings, next.line.id, sideNext, here.line.id, next.t, here.t, FLOW_LINE_VOTES);
  }
}

function sideOf(shape: Polyline, s: number, at: Pair, point: Pair): Side {
  const [dx, dy] = directionAt(shape, s);
  return dx * (point[1] - at[1]) - dy * (point[0] - at[0]) < 0 ? 0 : 1;
}

function linksFrom(heads: readonly HeadLine[], sightings: Sightings): NeighbourLink[] {
  const links: NeighbourLink[] = [];
  for (let i = 0; i < heads.length; i += 1) {
    for (let j = i + 1; j < heads.length; j += 1) {
      const link = linkBetween(heads[i]!, heads[j]!, sightings);
      if (link !== null) links.push(link);
    }
  }
  return links;
}

function linkBetween(a: HeadLine, b: HeadLine, sightings: Sightings): NeighbourLink | null {
  const fromA = viewOf(a.id, b.id, sightings);
  const fromB = viewOf(b.id, a.id, sightings);
  const seen = (view: View | null, line: HeadLine) =>
    line.role !== 'equipotential' || (view !== null && view.share >= LEAST_SHARE);
  const linked = (fromA?.foremost && seen(fromB, b)) || (fromB?.foremost && seen(fromA, a));
  if (!linked) return null;
  return {
    a: a.id,
    sideA: fromA?.side ?? 0,
    b: b.id,
    sideB: fromB?.side ?? 0,
    // Each line's own view by itself: past the tip of a wall the two views lie far apart, and together would say the contrary.
    sameDirection: covariance(fromA?.pairs ?? []) + covariance(fromB?.pairs ?? []) >= 0,
  };
}

type View = { side: Side; share: number; foremost: boolean; pairs: Seen['pairs'] };

/** How one line sees another, from the side from which it sees it most. */
function viewOf(from: string, to: string, sightings: Sightings): View | null {
  const sides = sightings.get(from)!;
  const side: Side = (sides[0].get(to)?.count ?? 0) >= (sides[1].get(to)?.count ?? 0) ? 0 : 1;
  const seen = sides[side].get(to);
  if (seen === undefined) return null;
  const counts = [...sides[side].values()].map((other) => other.count);
  const all = counts.reduce((sum, count) => sum + count, 0);
  return { side, share: seen.count / all, foremost: seen.count >= Math.max(...counts), pairs: seen.pairs };
}

function covariance(pairs: ReadonlyArray<readonly [number, number]>): number {
  const n = pairs.length;
  const meanA = pairs.reduce((sum, pair) => sum + pair[0], 0) / n;
  const meanB = pairs.reduce((sum, pair) => sum + pair[1], 0) / n;
  return pairs.reduce((sum, pair) => sum + (pair[0] - meanA) * (pair[1] - meanB), 0);
}
