import { distancesOf } from '#shared/compute/geometry/edit-lines/cut.ts';
import { type Polyline, pointAlong, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { withoutTremor } from '#shared/compute/geometry/tremor.ts';

/** A line turns a corner where its directions before and after differ by more than this, degrees. */
const CORNER_DEG = 40;
/** Those directions are taken over so many times the tolerance, so that the tremor of the hand makes no corner. */
const CHORD_TOLERANCES = 8;

/** A smoothed line, and the farthest that a vertex was moved, in the unit of the points. */
export type Smoothed = { readonly points: readonly Pair[]; readonly farthest: number };

/**
 * A line without the tremor of the hand, vertex by vertex, none moved farther than `tolerance`; one frame and unit. Ends
 * and corners stay exactly where they are; between them the tremor is taken off as in `withoutTremor`, which leaves a line
 * that has none as it is. Turning, shifting, mirroring or reversing the line does the same to the result.
 */
export function smoothed(points: readonly Pair[], tolerance: number): Smoothed {
  const fixed = [0, ...cornersOf(points, CHORD_TOLERANCES * tolerance), points.length - 1];
  const result: Pair[] = [...points];
  let farthest = 0;
  for (let k = 0; k + 1 < fixed.length; k += 1) {
    const from = fixed[k]!;
    const calm = withoutTremor(points.slice(from, fixed[k + 1]! + 1), tolerance);
    for (let i = from + 1; i < fixed[k + 1]!; i += 1) {
      const place = heldWithin(points[i]!, calm[i - from]!, tolerance);
      farthest = Math.max(farthest, Math.hypot(place[0] - points[i]![0], place[1] - points[i]![1]));
      result[i] = place;
    }
  }
  return farthest > 0 ? { points: result, farthest } : { points, farthest: 0 };
}

/**
 * Vertices at which a line turns a corner, without its ends, ascending. `chord`: the length over which its directions
 * before and after a vertex are taken, unit of the points; of several vertices within it that turn, the sharpest.
 */
export function cornersOf(points: readonly Pair[], chord: number): number[] {
  const line = polylineOf(points);
  if (line === null) return [];
  const along = distancesOf(points);
  const turns = points.map((at, i) => turnAt(line, along, at, i, chord));
  return turns.flatMap((turn, i) => (turn > CORNER_DEG && isSharpest(turns, along, i, chord) ? [i] : []));
}

/** Degrees by which the line turns at vertex `i`; 0 at its ends. */
function turnAt(line: Polyline, along: readonly number[], at: Pair, i: number, chord: number): number {
  if (i === 0 || i === along.length - 1) return 0;
  const before = pointAlong(line, along[i]! - Math.max(chord, along[i]! - along[i - 1]!));
  const after = pointAlong(line, along[i]! + Math.max(chord, along[i + 1]! - along[i]!));
  const [ux, uy] = [at[0] - before[0], at[1] - before[1]];
  const [vx, vy] = [after[0] - at[0], after[1] - at[1]];
  return (Math.abs(Math.atan2(ux * vy - uy * vx, ux * vx + uy * vy)) * 180) / Math.PI;
}

function isSharpest(turns: readonly number[], along: readonly number[], i: number, chord: number): boolean {
  for (let j = i - 1; j >= 0 && along[i]! - along[j]! < chord; j -= 1)
    if (turns[j]! > turns[i]!) return false;
  for (let j = i + 1; j < turns.length && along[j]! - along[i]! < chord; j += 1) {
    if (turns[j]! > turns[i]!) return false;
  }
  return true;
}

/** `to`, or the place on the way there that is `tolerance` from `from`. */
function heldWithin(from: Pair, to: Pair, tolerance: number): Pair {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const away = Math.hypot(dx, dy);
  if (away <= tolerance) return away > 0 ? to : from;
  return [from[0] + (dx * tolerance) / away, from[1] + (dy * tolerance) / away];
}
