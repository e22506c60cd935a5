import { angleBetween } from '#shared/compute/cells/quadrilateral.ts';
import {
  distanceToPolyline,
  firstOf,
  lastOf,
  lengthOf,
  type Polyline,
  pointAlong,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';

/** A boundary that turns by more than this has a corner there: at it the net's lines need not meet at right angles. */
export const CORNER_DEG = 35;

/**
 * A direction is taken over this many tracing accuracies, and over no less than these pixels: the hand's tremor then
 * turns it by 4 degrees (√2/20), so that a corner of 35 degrees is no tremor.
 */
const CHORD_ACCURACIES = 20;
const LEAST_CHORD_PX = 12;

/** The length in working pixels over which the direction of a traced line is taken. */
export function chordFor(accuracyPx: number): number {
  return Math.max(LEAST_CHORD_PX, CHORD_ACCURACIES * accuracyPx);
}

/**
 * The places at which the shape of the ground itself breaks the net up: corners of impervious outlines and of potential
 * boundaries, and free ends of walls (the tip of a sheet pile). There gradients are zero or without bound, and cells are
 * three- or five-sided however well they are drawn. Working pixels.
 */
export function singularPoints({ lines, potentials, reach }: NetModel, accuracyPx: number): Pair[] {
  const chord = chordFor(accuracyPx);
  const walls = linesOfKind(lines, 'impervious').map((line) => line.shape);
  const faces = potentials.map((potential) => potential.shape);
  return [
    ...[...walls, ...faces].flatMap((shape) => cornersOf(shape, chord)),
    ...walls.flatMap((wall, i) => {
      const others = walls.filter((_, k) => k !== i);
      return endsOf(wall, chord).flatMap((end) => {
        const meets = [...others, ...faces].filter((shape) => distanceToPolyline(shape, ...end.at) <= reach);
        return meets.length === 0 || others.some((other) => turnsInto(end, other, chord, reach))
          ? [end.at]
          : [];
      });
    }),
  ];
}

type End = { readonly at: Pair; readonly inward: Pair };

function endsOf(shape: Polyline, chord: number): [End, End] {
  const length = lengthOf(shape);
  const by = Math.min(chord, length);
  return [
    { at: firstOf(shape), inward: towards(firstOf(shape), pointAlong(shape, by)) },
    { at: lastOf(shape), inward: towards(lastOf(shape), pointAlong(shape, length - by)) },
  ];
}

/** True when a wall that ends on the end of another one leads off in another direction than it came. */
function turnsInto(end: End, other: Polyline, chord: number, reach: number): boolean {
  const met = endsOf(other, chord).find(
    ({ at }) => Math.hypot(at[0] - end.at[0], at[1] - end.at[1]) <= reach,
  );
  // Where it ends on the run of another wall the two always make a corner.
  if (met === undefined) return distanceToPolyline(other, ...end.at) <= reach;
  return 180 - angleBetween(end.inward, met.inward) > CORNER_DEG;
}

/** The corners of one line: where the chords before and after a vertex differ in direction, the sharpest of each run. */
export function cornersOf(shape: Polyline, chord: number): Pair[] {
  const length = lengthOf(shape);
  const corners: Array<{ s: number; turn: number; at: Pair }> = [];
  for (let i = 1; i + 1 < shape.cum.length; i += 1) {
    const s = shape.cum[i]!;
    const by = Math.min(chord, s, length - s);
    if (by < chord / 2) continue;
    const at: Pair = [shape.xy[2 * i]!, shape.xy[2 * i + 1]!];
    const turn = angleBetween(towards(pointAlong(shape, s - by), at), towards(at, pointAlong(shape, s + by)));
    if (turn <= CORNER_DEG) continue;
    const last = corners[corners.length - 1];
    if (last === undefined || s - last.s > chord) corners.push({ s, turn, at });
    else if (turn > last.turn) corners[corners.length - 1] = { s, turn, at };
  }
  return corners.map((corner) => corner.at);
}

function towards(from: Pair, to: Pair): Pair {
  return [to[0] - from[0], to[1] - from[1]];
}
