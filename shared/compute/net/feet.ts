import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  firstOf,
  lastOf,
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
  polylineOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * A line on which equipotentials may end: the real boundaries, and flow lines where no boundary is traced. `held` marks
 * boundaries with heads: a free face, or one with a single head, on which an equipotential of that head may end.
 */
export type Carrier = {
  readonly id: string;
  readonly shape: Polyline;
  readonly real: boolean;
  readonly held?: 'alongIt' | 'atOneHead';
};

/** Where an equipotential ends on a carrier: distance along the carrier in pixels, the place, real boundary or not. */
export type Foot = { readonly carrier: Carrier; readonly s: number; readonly at: Pair };

/** An equipotential carried to its feet: `shape` runs from foot to foot where there are feet. */
export type FootedLine = { readonly shape: Polyline; readonly start: Foot | null; readonly end: Foot | null };

/**
 * Carries an equipotential to the boundaries at which it ends: a small gap is bridged, a small overshoot cut off.
 * All in base-raster pixels; `reach` is the greatest gap or overshoot taken for a tracing error. A boundary
 * that no flow crosses is preferred to one with a head, and that to a flow line. An end with nothing in reach stays as traced, without a foot.
 */
export function carryToFeet(line: Polyline, carriers: readonly Carrier[], reach: number): FootedLine {
  const near = Math.min(reach, 0.25 * lengthOf(line));
  const start = footAt(line, 'start', carriers, near);
  const end = footAt(line, 'end', carriers, near);
  const length = lengthOf(line);
  const from = Math.min(start?.cut ?? 0, length / 2);
  const to = Math.max(length - (end?.cut ?? 0), length / 2);
  const points = [...pieceOf(line, from, to)];
  if (start) points.unshift(start.foot.at);
  if (end) points.push(end.foot.at);
  return { shape: polylineOf(points) ?? line, start: start?.foot ?? null, end: end?.foot ?? null };
}

type FoundFoot = { foot: Foot; cut: number };

function footAt(
  line: Polyline,
  which: 'start' | 'end',
  carriers: readonly Carrier[],
  near: number,
): FoundFoot | null {
  const turns = [
    carriers.filter(({ real, held }) => real && held !== 'atOneHead'),
    carriers.filter(({ held }) => held === 'atOneHead'),
    carriers.filter(({ real }) => !real),
  ];
  for (const carriersInTurn of turns) {
    const found = carriersInTurn
      .map((carrier) => footOn(line, which, carrier, near))
      .filter((foot) => foot !== null)
      .sort((a, b) => a.error - b.error)[0];
    if (found) return found;
  }
  return null;
}

function footOn(
  line: Polyline,
  which: 'start' | 'end',
  carrier: Carrier,
  near: number,
): (FoundFoot & { error: number }) | null {
  const tip = which === 'start' ? firstOf(line) : lastOf(line);
  const { box } = carrier.shape;
  if (tip[0] < box.minX - near || tip[0] > box.maxX + near) return null;
  if (tip[1] < box.minY - near || tip[1] > box.maxY + near) return null;
  const length = lengthOf(line);
  // The innermost crossing within reach of the tip: what lies beyond it is overshoot, however often it crosses.
  const cuts = crossingsOf(line, carrier.shape)
    .map((crossing) => ({ ...crossing, cut: which === 'start' ? crossing.s : length - crossing.s }))
    .filter((crossing) => crossing.cut <= near)
    .sort((a, b) => b.cut - a.cut);
  const crossing = cuts[0];
  if (crossing) {
    return { foot: { carrier, s: crossing.t, at: crossing.at }, cut: crossing.cut, error: crossing.cut };
  }
  const place = nearestOnPolyline(carrier.shape, tip[0], tip[1]);
  if (place.distance > near) return null;
  return { foot: { carrier, s: place.s, at: place.at }, cut: 0, error: place.distance };
}
