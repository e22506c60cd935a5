import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { lengthOf, nearestOnPolyline, pointAlong, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** A place nearer than this to a vertex or an end, in the unit of the points, is that vertex or end. */
const SAME_PLACE = 0.01;

/** The two pieces of a line that is cut; both hold the place of the cut. */
export type Cut = { readonly before: readonly Pair[]; readonly after: readonly Pair[] };

/** Distance along a line to each of its vertices, from 0; any one frame. */
export function distancesOf(points: readonly Pair[]): number[] {
  const along: number[] = [];
  let s = 0;
  points.forEach((point, i) => {
    if (i > 0) s += Math.hypot(point[0] - points[i - 1]![0], point[1] - points[i - 1]![1]);
    along.push(s);
  });
  return along;
}

/**
 * Cuts a line at distance `s` along it, same unit as its points. A vertex nearer than a hundredth becomes the place of
 * the cut, otherwise a place is put in between two. Vertices that stay are the same pairs as before. Null where a piece
 * would have no length.
 */
export function cutAt(points: readonly Pair[], s: number): Cut | null {
  const along = distancesOf(points);
  const line = polylineOf(points);
  if (line === null || !(s > SAME_PLACE) || !(s < lengthOf(line) - SAME_PLACE)) return null;
  const vertex = along.findIndex((at) => Math.abs(at - s) <= SAME_PLACE);
  const place = vertex < 0 ? pointAlong(line, s) : points[vertex]!;
  return {
    before: [...points.filter((_, i) => along[i]! < s - SAME_PLACE), place],
    after: [place, ...points.filter((_, i) => along[i]! > s + SAME_PLACE)],
  };
}

/** Cuts a line at one of its vertices; null at its ends and where a piece would have no length. */
export function cutAtVertex(points: readonly Pair[], index: number): Cut | null {
  if (index <= 0 || index >= points.length - 1) return null;
  const cut = { before: points.slice(0, index + 1), after: points.slice(index) };
  return polylineOf(cut.before) === null || polylineOf(cut.after) === null ? null : cut;
}

/** Distance along a line to its place nearest to `at`, one frame; null when the line has no length. */
export function alongNearest(points: readonly Pair[], at: Pair): number | null {
  const line = polylineOf(points);
  return line === null ? null : nearestOnPolyline(line, at[0], at[1]).s;
}

/**
 * Distances along a line at which it crosses or touches any of the others, ascending, one frame. Places at its own
 * ends are left out: nothing could be cut off there.
 */
export function meetingsAlong(points: readonly Pair[], others: ReadonlyArray<readonly Pair[]>): number[] {
  const line = polylineOf(points);
  if (line === null) return [];
  const length = lengthOf(line);
  const found = others.flatMap((other) => {
    const second = polylineOf(other);
    return second === null ? [] : crossingsOf(line, second).map(({ s }) => s);
  });
  return found.filter((s) => s > SAME_PLACE && s < length - SAME_PLACE).sort((a, b) => a - b);
}

/** Which end of a line is kept when it is trimmed: the piece that holds its first or its last vertex. */
export type KeptEnd = 'first' | 'last';

/** A trimmed line: what is kept and what goes; both hold the place of the cut. */
export type Trimmed = { readonly kept: readonly Pair[]; readonly gone: readonly Pair[] };

/**
 * Trims a line where it meets a cutting line, one frame: at the meeting nearest to `near`, keeping the longer piece, or
 * with `other` the shorter. Null when the two do not meet away from the line's ends.
 */
export function trimmedAt(
  points: readonly Pair[],
  cutter: readonly Pair[],
  near: Pair,
  other = false,
): Trimmed | null {
  const line = polylineOf(points);
  if (line === null) return null;
  const length = lengthOf(line);
  const apart = (s: number) => {
    const [x, y] = pointAlong(line, s);
    return Math.hypot(x - near[0], y - near[1]);
  };
  const [s] = meetingsAlong(points, [cutter]).sort((a, b) => apart(a) - apart(b));
  if (s === undefined) return null;
  const longer: KeptEnd = s >= length / 2 ? 'first' : 'last';
  const kept = other ? (longer === 'first' ? 'last' : 'first') : longer;
  return trimmedTo(points, s, kept);
}

/** Trims a line at distance `s` along it and keeps the piece with the end named; null where a piece has no length. */
export function trimmedTo(points: readonly Pair[], s: number, kept: KeptEnd): Trimmed | null {
  const cut = cutAt(points, s);
  if (cut === null) return null;
  return kept === 'first' ? { kept: cut.before, gone: cut.after } : { kept: cut.after, gone: cut.before };
}

/**
 * Takes off the end piece that is pointed at: from the end as far as the first meeting with any of the others, one
 * frame. `between`: the place lies between two meetings, so that taking it out would leave two lines. Null when the line
 * meets none of them.
 */
export function endPieceOff(
  points: readonly Pair[],
  others: ReadonlyArray<readonly Pair[]>,
  at: Pair,
): Trimmed | 'between' | null {
  const s = alongNearest(points, at);
  const meetings = meetingsAlong(points, others);
  const [first] = meetings;
  const last = meetings.at(-1);
  if (s === null || first === undefined || last === undefined) return null;
  if (s < first) return trimmedTo(points, first, 'last');
  return s > last ? trimmedTo(points, last, 'first') : 'between';
}
