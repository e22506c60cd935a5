import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

export type Box = {
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
};

/**
 * An open polyline. `xy`: vertices, flat, length 2·n, x0 y0 x1 y1 …, any one frame, no two consecutive equal;
 * `cum`: distance along the line at each vertex, length n, starting at 0; `runs`: boxes of every run of `RUN` segments,
 * flat, minX minY maxX maxY …, so that a search can pass over what is far away.
 */
export type Polyline = {
  readonly xy: Float64Array;
  readonly cum: Float64Array;
  readonly box: Box;
  readonly runs: Float64Array;
};

/** Segments to a run. */
export const RUN = 12;

/** A place on a polyline: its distance along it, its coordinates, and how far the asking point was from it. */
export type PolylinePlace = {
  readonly s: number;
  readonly at: Pair;
  readonly distance: number;
  readonly segment: number;
};

/**
 * A polyline through points, repeated points left out. `points`: any one frame. Returns null when fewer than two
 * distinct points remain or a coordinate is not finite.
 */
export function polylineOf(points: readonly Pair[]): Polyline | null {
  const kept: number[] = [];
  for (const point of points) {
    const x = point[0];
    const y = point[1];
    if (!Number.isFinite(x) || !Number.isFinite(y)) return null;
    const n = kept.length;
    if (n > 0 && kept[n - 2] === x && kept[n - 1] === y) continue;
    kept.push(x, y);
  }
  return kept.length < 4 ? null : polylineFromFlat(Float64Array.from(kept));
}

/** A polyline from flat coordinates (layout as in `Polyline`), which must hold at least two distinct vertices. */
export function polylineFromFlat(xy: Float64Array): Polyline {
  const n = xy.length / 2;
  const cum = new Float64Array(n);
  let minX = Number.POSITIVE_INFINITY;
  let minY = Number.POSITIVE_INFINITY;
  let maxX = Number.NEGATIVE_INFINITY;
  let maxY = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < n; i += 1) {
    const x = xy[2 * i]!;
    const y = xy[2 * i + 1]!;
    minX = Math.min(minX, x);
    minY = Math.min(minY, y);
    maxX = Math.max(maxX, x);
    maxY = Math.max(maxY, y);
    if (i > 0) cum[i] = cum[i - 1]! + lengthOfVector(x - xy[2 * i - 2]!, y - xy[2 * i - 1]!);
  }
  return { xy, cum, box: { minX, minY, maxX, maxY }, runs: runBoxes(xy) };
}

function runBoxes(xy: Float64Array): Float64Array {
  const segments = xy.length / 2 - 1;
  const runs = new Float64Array(4 * Math.ceil(segments / RUN));
  for (let r = 0; 4 * r < runs.length; r += 1) {
    const last = Math.min(segments, (r + 1) * RUN);
    let minX = Number.POSITIVE_INFINITY;
    let minY = Number.POSITIVE_INFINITY;
    let maxX = Number.NEGATIVE_INFINITY;
    let maxY = Number.NEGATIVE_INFINITY;
    for (let i = r * RUN; i <= last; i += 1) {
      minX = Math.min(minX, xy[2 * i]!);
      maxX = Math.max(maxX, xy[2 * i]!);
      minY = Math.min(minY, xy[2 * i + 1]!);
      maxY = Math.max(maxY, xy[2 * i + 1]!);
    }
    runs.set([minX, minY, maxX, maxY], 4 * r);
  }
  return runs;
}

/** Length of a polyline in its frame's unit. */
export function lengthOf(line: Polyline): number {
  return line.cum[line.cum.length - 1]!;
}

/** Vertex `i` of a polyline; `i` from 0 to n − 1. */
export function vertexOf(line: Polyline, i: number): Pair {
  return [line.xy[2 * i]!, line.xy[2 * i + 1]!];
}

export function firstOf(line: Polyline): Pair {
  return vertexOf(line, 0);
}

export function lastOf(line: Polyline): Pair {
  return vertexOf(line, line.cum.length - 1);
}

/** Coordinates at distance `s` along a polyline, held to its ends. */
export function pointAlong(line: Polyline, s: number): Pair {
  const i = segmentAlong(line, s);
  const from = line.cum[i]!;
  const span = line.cum[i + 1]! - from;
  const t = span > 0 ? Math.min(1, Math.max(0, (s - from) / span)) : 0;
  const [ax, ay] = vertexOf(line, i);
  const [bx, by] = vertexOf(line, i + 1);
  return [ax + t * (bx - ax), ay + t * (by - ay)];
}

/** Index of the segment that holds distance `s`, held to the first and last. */
export function segmentAlong(line: Polyline, s: number): number {
  let low = 0;
  let high = line.cum.length - 2;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (line.cum[middle]! <= s) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** Nearest place on a polyline to a point, same frame. Of several equally near places the first along the line. */
export function nearestOnPolyline(line: Polyline, x: number, y: number): PolylinePlace {
  const { xy, cum } = line;
  const segment = nearestSegment(line, x, y);
  const part = partAlong(xy, segment, x, y);
  const ax = xy[2 * segment]!;
  const ay = xy[2 * segment + 1]!;
  const px = ax + part * (xy[2 * segment + 2]! - ax);
  const py = ay + part * (xy[2 * segment + 3]! - ay);
  const from = cum[segment]!;
  return {
    s: from + part * (cum[segment + 1]! - from),
    at: [px, py],
    distance: lengthOfVector(px - x, py - y),
    segment,
  };
}

/** Distance from a point to a polyline, same frame and unit. */
export function distanceToPolyline(line: Polyline, x: number, y: number): number {
  return Math.sqrt(squareToSegment(line.xy, nearestSegment(line, x, y), x, y));
}

/** The segment nearest to a point, the first of several. */
function nearestSegment(line: Polyline, x: number, y: number): number {
  const last = line.cum.length - 1;
  let best = Number.POSITIVE_INFINITY;
  let nearest = 0;
  for (let i = 0; i < last; i += 1) {
    if (i % RUN === 0 && squareToRun(line, i / RUN, x, y) >= best) {
      i += RUN - 1;
      continue;
    }
    const square = squareToSegment(line.xy, i, x, y);
    if (square < best) {
      best = square;
      nearest = i;
    }
  }
  return nearest;
}

/** Where along segment `i` the place nearest to a point lies: 0 at its start, 1 at its end. */
function partAlong(xy: Float64Array, i: number, x: number, y: number): number {
  const ax = xy[2 * i]!;
  const ay = xy[2 * i + 1]!;
  const dx = xy[2 * i + 2]! - ax;
  const dy = xy[2 * i + 3]! - ay;
  return Math.min(1, Math.max(0, ((x - ax) * dx + (y - ay) * dy) / (dx * dx + dy * dy)));
}

function squareToSegment(xy: Float64Array, i: number, x: number, y: number): number {
  const part = partAlong(xy, i, x, y);
  const ax = xy[2 * i]!;
  const ay = xy[2 * i + 1]!;
  const ex = ax + part * (xy[2 * i + 2]! - ax) - x;
  const ey = ay + part * (xy[2 * i + 3]! - ay) - y;
  return ex * ex + ey * ey;
}

/** Squared distance from a point to the box of a run; 0 inside it. */
function squareToRun({ runs }: Polyline, run: number, x: number, y: number): number {
  const dx = Math.max(runs[4 * run]! - x, 0, x - runs[4 * run + 2]!);
  const dy = Math.max(runs[4 * run + 1]! - y, 0, y - runs[4 * run + 3]!);
  return dx * dx + dy * dy;
}

/**
 * Points of the piece of a polyline from distance `s0` to `s1`, both ends included; in reverse order when s1 < s0.
 * Equal distances give that one place.
 */
export function pieceOf(line: Polyline, s0: number, s1: number): Pair[] {
  if (s1 < s0) return pieceOf(line, s1, s0).reverse();
  const points: Pair[] = [pointAlong(line, s0)];
  for (let i = 0; i < line.cum.length; i += 1) {
    const s = line.cum[i]!;
    if (s > s0 && s < s1) points.push(vertexOf(line, i));
  }
  if (s1 > s0) points.push(pointAlong(line, s1));
  return points;
}

/** All vertices of a polyline as pairs. */
export function verticesOf(line: Polyline): Pair[] {
  const vertices: Pair[] = [];
  for (let i = 0; i < line.cum.length; i += 1) vertices.push(vertexOf(line, i));
  return vertices;
}

/** True when two boxes, the first grown by `margin`, have a point in common. */
export function boxesMeet(a: Box, b: Box, margin = 0): boolean {
  return (
    a.minX - margin <= b.maxX &&
    b.minX <= a.maxX + margin &&
    a.minY - margin <= b.maxY &&
    b.minY <= a.maxY + margin
  );
}

/** True when points are at flat coordinates x0 y0 x1 y1 …, to the last bit. */
export function areAt(points: readonly Pair[], xy: Float64Array): boolean {
  if (2 * points.length !== xy.length) return false;
  for (let i = 0; i < points.length; i += 1) {
    if (points[i]![0] !== xy[2 * i] || points[i]![1] !== xy[2 * i + 1]) return false;
  }
  return true;
}
