import type { NetFamily } from '#shared/compute/cells/cells-beside.ts';
import { angleBetween } from '#shared/compute/cells/quadrilateral.ts';
import { chordFor } from '#shared/compute/cells/singular-points.ts';
import { nearestOnPolyline, type Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { tangentOfBoundary, tangentOfCurve } from '#shared/compute/net-check/tangent.ts';
import type { LineKind, TracedLine } from '#shared/contract/document.ts';

const FAMILIES: Readonly<Record<LineKind, NetFamily | null>> = {
  equipotential: 'head',
  submergedFace: 'head',
  drain: 'head',
  flowLine: 'flow',
  impervious: 'flow',
  phreaticLine: 'flow',
  // Neither: the head varies along a free face and water passes through it, as it does through the others.
  outflowFace: null,
  ground: null,
  soilBoundary: null,
};

/** To which family of the net a kind of line belongs; null for one that is neither. */
export function familyOf(kind: LineKind): NetFamily | null {
  return FAMILIES[kind];
}

type Meeting = Pick<TracedLine, 'line' | 'head'>;

/**
 * True where two lines should meet at a right angle: an equipotential and a flow line, and each with the boundaries of
 * the other family. Two boundaries meet as the ground has it; along an empty drain the head may vary, so that no angle is
 * asked for there.
 */
export function wantsRightAngle(a: Meeting, b: Meeting): boolean {
  const traced = [a, b].some(({ line }) => line === 'equipotential' || line === 'flowLine');
  const isOpen = ({ line, head }: Meeting) => line === 'drain' && head === null;
  const [one, other] = [familyOf(a.line), familyOf(b.line)];
  return traced && one !== null && other !== null && one !== other && !isOpen(a) && !isOpen(b);
}

/**
 * The sharper angle, 0 to 90 degrees, at which a straight segment of direction `along` meets a line at the place nearest
 * to `at`. The line's direction is fitted over the length that the tracing accuracy asks for, as in the net check:
 * `isBoundary` for one that may be straight from corner to corner. All in working pixels.
 */
export function meetingAngle(
  along: Pair,
  line: Polyline,
  at: Pair,
  isBoundary: boolean,
  accuracyPx: number,
): number {
  const { s } = nearestOnPolyline(line, ...at);
  const tangentOf = isBoundary ? tangentOfBoundary : tangentOfCurve;
  const angle = angleBetween(along, tangentOf(line, s, chordFor(accuracyPx), accuracyPx).direction);
  return Math.min(angle, 180 - angle);
}
