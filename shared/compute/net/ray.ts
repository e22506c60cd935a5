import { lengthOf, type Polyline, RUN } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { HeadLine } from '#shared/compute/net/neighbours.ts';

/** What a ray meets first: the line and the distance along that line. */
export type RayHit = { readonly line: HeadLine; readonly s: number; readonly distance: number };

/**
 * The first head line that a ray meets, or null when it meets nothing, its own line again, or a wall before that.
 * `at` and `direction` (a unit vector) in the frame of the shapes.
 */
export function castRay(
  at: Pair,
  direction: Pair,
  own: HeadLine,
  heads: readonly HeadLine[],
  walls: readonly Polyline[],
): RayHit | null {
  // Boundaries are traced over one another and hands tremble: what lies this near is the line the ray starts from.
  const near = 0.02 * lengthOf(own.shape);
  let best: RayHit | null = null;
  let limit = Number.POSITIVE_INFINITY;
  for (const line of heads) {
    const hit = firstHit(at, direction, line.shape, limit, line === own ? near : 0);
    if (hit === null) continue;
    limit = hit.distance;
    best = line === own ? null : { line, ...hit };
  }
  for (const wall of walls) {
    if (firstHit(at, direction, wall, limit, near) !== null) return null;
  }
  return best;
}

function firstHit(
  at: Pair,
  direction: Pair,
  shape: Polyline,
  limit: number,
  least: number,
): { s: number; distance: number } | null {
  if (!mayMeet(at, direction, shape)) return null;
  let found: { s: number; distance: number } | null = null;
  let nearest = limit;
  for (let run = 0; 4 * run < shape.runs.length; run += 1) {
    if (!mayMeetRun(at, direction, shape, run)) continue;
    const hit = firstInRun(at, direction, shape, run, nearest, least);
    if (hit === null) continue;
    found = hit;
    nearest = hit.distance;
  }
  return found;
}

function firstInRun(
  at: Pair,
  direction: Pair,
  { xy, cum }: Polyline,
  run: number,
  limit: number,
  least: number,
): { s: number; distance: number } | null {
  const dx = direction[0];
  const dy = direction[1];
  let found: { s: number; distance: number } | null = null;
  let nearest = limit;
  const first = run * RUN;
  const last = Math.min(cum.length - 1, first + RUN);
  // Offset of each vertex from the ray's line: a change of sign is a crossing.
  let before = dx * (xy[2 * first + 1]! - at[1]) - dy * (xy[2 * first]! - at[0]);
  for (let i = first + 1; i <= last; i += 1) {
    const x = xy[2 * i]!;
    const y = xy[2 * i + 1]!;
    const here = dx * (y - at[1]) - dy * (x - at[0]);
    if (before < 0 !== here < 0) {
      const t = before / (before - here);
      const x0 = xy[2 * i - 2]!;
      const y0 = xy[2 * i - 1]!;
      const distance = dx * (x0 + t * (x - x0) - at[0]) + dy * (y0 + t * (y - y0) - at[1]);
      if (distance > least && distance < nearest) {
        nearest = distance;
        found = { s: cum[i - 1]! + t * (cum[i]! - cum[i - 1]!), distance };
      }
    }
    before = here;
  }
  return found;
}

function mayMeet(at: Pair, direction: Pair, { box }: Polyline): boolean {
  return mayMeetBox(at, direction, box.minX, box.minY, box.maxX, box.maxY);
}

function mayMeetRun(at: Pair, direction: Pair, { runs }: Polyline, run: number): boolean {
  const k = 4 * run;
  return mayMeetBox(at, direction, runs[k]!, runs[k + 1]!, runs[k + 2]!, runs[k + 3]!);
}

function mayMeetBox(
  at: Pair,
  direction: Pair,
  minX: number,
  minY: number,
  maxX: number,
  maxY: number,
): boolean {
  // Asked some million times for a large net: taken apart as a list, each direction would leave objects behind.
  const dx = direction[0];
  const dy = direction[1];
  if (dx > 0 ? maxX < at[0] : dx < 0 ? minX > at[0] : minX > at[0] || maxX < at[0]) return false;
  if (dy > 0 ? maxY < at[1] : dy < 0 ? minY > at[1] : minY > at[1] || maxY < at[1]) return false;
  const a = dx * (minY - at[1]) - dy * (minX - at[0]);
  const b = dx * (minY - at[1]) - dy * (maxX - at[0]);
  const c = dx * (maxY - at[1]) - dy * (minX - at[0]);
  const d = dx * (maxY - at[1]) - dy * (maxX - at[0]);
  return Math.min(a, b, c, d) <= 0 && Math.max(a, b, c, d) >= 0;
}
