import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  type Box,
  firstOf,
  lastOf,
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pointAlong,
  polylineOf,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** A soil boundary carried on to what it should end at, and where it had to be carried far. */
export type ClosedBoundary = { readonly points: readonly Pair[]; readonly openAt: readonly Pair[] };

/** Part of a boundary's length over which its direction at an end is taken. */
const END_PART = 0.1;

/** An end steeper than this, as the sine of its slope, is no ground and no base. */
const STEEP = 0.5;

/**
 * Carries the ends of soil boundaries on: to another line, or to the boundary's own other end, within `reach`, the gap of
 * a tracing error; else straight on to the first line it meets or to the edge of `frame`. An end that is carried farther
 * than `reach` to a line stands in `openAt`. `lines`: everything at which a boundary may end, other boundaries included.
 */
export function closeBoundary(
  boundary: Polyline,
  lines: readonly Polyline[],
  frame: Polyline,
  reach: number,
): ClosedBoundary {
  const points = verticesOf(boundary);
  const [first, last] = [firstOf(boundary), lastOf(boundary)];
  if (Math.hypot(first[0] - last[0], first[1] - last[1]) <= reach) {
    return { points: [...points, first], openAt: [] };
  }
  const near = Math.max(1, END_PART * lengthOf(boundary));
  const head = carriedOn(first, pointAlong(boundary, near), lines, frame, reach);
  const tail = carriedOn(last, pointAlong(boundary, lengthOf(boundary) - near), lines, frame, reach);
  const added = (end: Carried) => (end === null ? [] : [end.to]);
  return {
    points: [...added(head), ...points, ...added(tail)],
    openAt: [head, tail].flatMap((end) => (end?.isOpen ? [end.from] : [])),
  };
}

/**
 * What joins the ends of a line that bounds the section to what lies beside them: a short piece to another line within
 * `reach`; or, where nothing lies on the way, a straight one to the edge of `frame`, so that the two sides of the section
 * are not one outside. `up`: the section's up; an end that points steeply is the tip of a wall and stays free.
 */
export function joinsOf(
  line: Polyline,
  lines: readonly Polyline[],
  frame: Polyline,
  reach: number,
  up: Pair,
): Pair[][] {
  const near = Math.max(1, END_PART * lengthOf(line));
  return [
    carriedOn(firstOf(line), pointAlong(line, near), lines, frame, reach),
    carriedOn(lastOf(line), pointAlong(line, lengthOf(line) - near), lines, frame, reach),
  ].flatMap((end) => {
    if (end === null || end.isOpen) return [];
    const [dx, dy] = [end.to[0] - end.from[0], end.to[1] - end.from[1]];
    const size = Math.hypot(dx, dy);
    const isSteep = size > reach && Math.abs(dx * up[0] + dy * up[1]) > STEEP * size;
    return isSteep ? [] : [[end.from, end.to]];
  });
}

type Carried = { from: Pair; to: Pair; isOpen: boolean } | null;

function carriedOn(
  end: Pair,
  inner: Pair,
  lines: readonly Polyline[],
  frame: Polyline,
  reach: number,
): Carried {
  const nearest = lines
    .map((line) => nearestOnPolyline(line, ...end))
    .sort((a, b) => a.distance - b.distance)[0];
  if (nearest !== undefined && nearest.distance <= reach) {
    return nearest.distance === 0 ? null : { from: end, to: nearest.at, isOpen: false };
  }
  const far = lengthOf(frame);
  const size = Math.hypot(end[0] - inner[0], end[1] - inner[1]);
  if (!(size > 0)) return null;
  const ray = polylineOf([
    end,
    [end[0] + ((end[0] - inner[0]) / size) * far, end[1] + ((end[1] - inner[1]) / size) * far],
  ]);
  if (ray === null) return null;
  const hits = lines.flatMap((line) => crossingsOf(ray, line)).sort((a, b) => a.s - b.s);
  const hit = hits[0] ?? crossingsOf(ray, frame)[0];
  return hit === undefined ? null : { from: end, to: hit.at, isOpen: hits.length > 0 };
}

/** A closed rectangle about boxes, a tenth of their extent away from them; null of none. */
export function frameAbout(boxes: readonly Box[]): Polyline | null {
  if (boxes.length === 0) return null;
  const minX = Math.min(...boxes.map((box) => box.minX));
  const maxX = Math.max(...boxes.map((box) => box.maxX));
  const minY = Math.min(...boxes.map((box) => box.minY));
  const maxY = Math.max(...boxes.map((box) => box.maxY));
  const off = 0.1 * Math.max(maxX - minX, maxY - minY);
  return polylineOf([
    [minX - off, minY - off],
    [maxX + off, minY - off],
    [maxX + off, maxY + off],
    [minX - off, maxY + off],
    [minX - off, minY - off],
  ]);
}
