import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { type LinearMap, mapped } from '#shared/compute/linear-map.ts';

/** A straight piece of a line and the line it belongs to. */
export type Piece<Id> = { readonly id: Id; readonly a: Pair; readonly b: Pair };

/** A place on a line, and how far the asking point was from it. One frame and unit. */
export type NearPlace<Id> = { readonly id: Id; readonly at: Pair; readonly distance: number };

/** Pieces more nearly parallel than this have no crossing worth the name (sine of the angle between them). */
const PARALLEL = 1e-6;

/** The nearest place to `at` on pieces of lines, within `reach`; null when none is that near. */
export function nearestOnPieces<Id>(
  pieces: readonly Piece<Id>[],
  at: Pair,
  reach: number,
): NearPlace<Id> | null {
  return nearestOf(
    pieces.map(({ id, a, b }) => ({ id, at: along(a, b, heldPart(a, b, at)) })),
    at,
    reach,
  );
}

/** The nearest crossing of pieces of two different lines, within `reach` of `at`; null when there is none. */
export function nearestCrossing<Id>(
  pieces: readonly Piece<Id>[],
  at: Pair,
  reach: number,
): NearPlace<Id> | null {
  const found: { id: Id; at: Pair }[] = [];
  for (let i = 0; i < pieces.length; i += 1) {
    for (let k = i + 1; k < pieces.length; k += 1) {
      const [p, q] = [pieces[i]!, pieces[k]!];
      const place = p.id === q.id ? null : crossingOf(p, q);
      if (place !== null) found.push({ id: p.id, at: place });
    }
  }
  return nearestOf(found, at, reach);
}

/**
 * The nearest place to `at`, within `reach`, at which a straight segment from `from` meets a line at a right angle: the
 * foot of the perpendicular on the line's piece. All in one frame; the angle is judged in the frame that `working` leads
 * to. Feet nearer than `reach` to `from` itself are left out: from a place on a line every way along it has one there.
 */
export function nearestFoot<Id>(
  pieces: readonly Piece<Id>[],
  from: Pair,
  at: Pair,
  reach: number,
  working: LinearMap,
): NearPlace<Id> | null {
  const found = pieces.flatMap(({ id, a, b }) => {
    const part = footPart(mapped(working, ...a), mapped(working, ...b), mapped(working, ...from));
    if (part === null || part < 0 || part > 1) return [];
    const place = along(a, b, part);
    return apart(place, from) <= reach ? [] : [{ id, at: place }];
  });
  return nearestOf(found, at, reach);
}

/** A line's end, and the place before it on the line. */
export type LineEnd<Id> = { readonly id: Id; readonly at: Pair; readonly inward: Pair };

/** A place straight on from an end of a line. */
export type Onward<Id> = NearPlace<Id> & { readonly from: Pair };

/**
 * The nearest place to `at`, within `reach`, on the straight continuation of a line beyond its end, no farther from the
 * end than `longest`; where the continuation meets one of `pieces` within `reach`, that meeting. Null when there is
 * none. One frame and unit.
 */
export function nearestOnward<Id>(
  ends: readonly LineEnd<Id>[],
  pieces: readonly Piece<Id>[],
  at: Pair,
  reach: number,
  longest: number,
): Onward<Id> | null {
  let best: Onward<Id> | null = null;
  for (const end of ends) {
    const step = apart(end.at, end.inward);
    if (!(step > 0)) continue;
    const tip: Pair = [
      end.at[0] + ((end.at[0] - end.inward[0]) * longest) / step,
      end.at[1] + ((end.at[1] - end.inward[1]) * longest) / step,
    ];
    const part = heldPart(end.at, tip, at);
    const place = along(end.at, tip, part);
    const distance = apart(place, at);
    if (part <= 0 || distance > (best?.distance ?? reach)) continue;
    const ray = { id: end.id, a: end.at, b: tip };
    const others = pieces.filter((piece) => piece.id !== end.id);
    const met = nearestOf(
      others.flatMap((piece) => {
        const meeting = crossingOf(ray, piece);
        return meeting === null ? [] : [{ id: end.id, at: meeting }];
      }),
      at,
      reach,
    );
    best = { id: end.id, at: met?.at ?? place, distance, from: end.at };
  }
  return best;
}

function nearestOf<Id>(
  places: ReadonlyArray<{ readonly id: Id; readonly at: Pair }>,
  at: Pair,
  reach: number,
): NearPlace<Id> | null {
  let best: NearPlace<Id> | null = null;
  for (const place of places) {
    const distance = apart(place.at, at);
    if (distance <= reach && (best === null || distance < best.distance)) best = { ...place, distance };
  }
  return best;
}

/** Where two pieces cross, their ends included; null where they do not, or run along one another. */
function crossingOf(p: Omit<Piece<unknown>, 'id'>, q: Omit<Piece<unknown>, 'id'>): Pair | null {
  const [rx, ry] = [p.b[0] - p.a[0], p.b[1] - p.a[1]];
  const [sx, sy] = [q.b[0] - q.a[0], q.b[1] - q.a[1]];
  const cross = rx * sy - ry * sx;
  if (!(Math.abs(cross) > PARALLEL * Math.hypot(rx, ry) * Math.hypot(sx, sy))) return null;
  const [dx, dy] = [q.a[0] - p.a[0], q.a[1] - p.a[1]];
  const t = (dx * sy - dy * sx) / cross;
  const u = (dx * ry - dy * rx) / cross;
  return t < 0 || t > 1 || u < 0 || u > 1 ? null : along(p.a, p.b, t);
}

/** Part of a piece at which the perpendicular from a place meets its straight line; null for a piece without length. */
function footPart(a: Pair, b: Pair, from: Pair): number | null {
  const [dx, dy] = [b[0] - a[0], b[1] - a[1]];
  const square = dx * dx + dy * dy;
  return square > 0 ? ((from[0] - a[0]) * dx + (from[1] - a[1]) * dy) / square : null;
}

function heldPart(a: Pair, b: Pair, at: Pair): number {
  return Math.min(1, Math.max(0, footPart(a, b, at) ?? 0));
}

function along(a: Pair, b: Pair, part: number): Pair {
  return [a[0] + part * (b[0] - a[0]), a[1] + part * (b[1] - a[1])];
}

function apart(a: Pair, b: Pair): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1]);
}
