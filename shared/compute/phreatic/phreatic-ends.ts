import { lengthOf, nearestOnPolyline, type Polyline, pointAlong } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import { angleBetween, directionOver } from '#shared/compute/phreatic/direction.ts';
import type { PhreaticEnd } from '#shared/contract/reading-phreatic.ts';

/** A phreatic line from its entry to its exit, with the boundaries that its ends meet; null where an end meets none. */
export type PhreaticCourse = {
  readonly shape: Polyline;
  readonly entryFace: Potential | null;
  readonly outlet: Potential | null;
};

/** Windows over which directions are taken: long against tremor, short against the bend of the line. */
const WINDOW_PART = 0.02;
const WINDOW_LEAST_PX = 10;

/** Length of the window for a line traced with an accuracy, pixels. */
export function windowOf(shape: Polyline, accuracyPx: number): number {
  return Math.max(WINDOW_LEAST_PX, 6 * accuracyPx, WINDOW_PART * lengthOf(shape));
}

/**
 * How the phreatic line stands to the upstream face: square to it, level where the face is upright or overhangs.
 * `up`: the section's up in the frame of the shapes. Judged in the transformed section where there is one. Null where
 * the line does not start at a face. Source: A. Casagrande (1937), Seepage through dams.
 */
export function entryOf(course: PhreaticCourse, up: Pair, accuracyPx: number): PhreaticEnd | null {
  const { shape, entryFace } = course;
  if (entryFace === null) return null;
  const window = windowOf(shape, accuracyPx);
  const at = pointAlong(shape, 0);
  const drawn = directionOver(shape, 0, window);
  const face = upTheFace(entryFace.shape, at, up, window);
  const overhangs = dot(face, flowDirection(shape, up)) <= LEANING;
  const expected: Pair = overhangs ? [-up[1], up[0]] : [-face[1], face[0]];
  return {
    at: [at[0], at[1]],
    expected: overhangs ? 'level' : 'square',
    departureDeg: angleBetween(drawn, expected),
  };
}

/**
 * How the phreatic line leaves: along a discharge face of up to 90°, vertically into an undercut face or a drain. Null
 * where it reaches no outlet above the tailwater. Source: A. Casagrande (1937), Seepage through dams.
 */
export function exitOf(course: PhreaticCourse, up: Pair, accuracyPx: number): PhreaticEnd | null {
  const { shape, outlet } = course;
  if (outlet === null || outlet.line.kind === 'submergedFace') return null;
  const window = windowOf(shape, accuracyPx);
  const end = lengthOf(shape);
  const at = pointAlong(shape, end);
  const drawn = directionOver(shape, end, window);
  const face = upTheFace(outlet.shape, at, up, window);
  const vertical = outlet.line.kind === 'drain' || dot(face, flowDirection(shape, up)) > LEANING;
  return {
    at: [at[0], at[1]],
    expected: vertical ? 'vertical' : 'alongFace',
    departureDeg: angleBetween(drawn, vertical ? up : face),
  };
}

/** A face leans when it gains this much along the flow for its length: a degree, within which it counts as upright. */
const LEANING = 0.0175;

function upTheFace(shape: Polyline, at: Pair, up: Pair, window: number): Pair {
  const { s } = nearestOnPolyline(shape, at[0], at[1]);
  const along = directionOver(shape, s, Math.min(window, lengthOf(shape)));
  return dot(along, up) >= 0 ? along : [-along[0], -along[1]];
}

/** The level direction along which the water goes from entry to exit. */
function flowDirection(shape: Polyline, up: Pair): Pair {
  const a = pointAlong(shape, 0);
  const b = pointAlong(shape, lengthOf(shape));
  const level: Pair = [-up[1], up[0]];
  return dot(level, [b[0] - a[0], b[1] - a[1]]) >= 0 ? level : [-level[0], -level[1]];
}

function dot(a: Pair, b: Pair): number {
  return a[0] * b[0] + a[1] * b[1];
}
