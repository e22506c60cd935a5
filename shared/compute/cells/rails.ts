import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { signedArea } from '#shared/compute/geometry/polygon.ts';
import {
  firstOf,
  lastOf,
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** What a rail is: a traced flow line, a traced boundary that no flow crosses, or a face of free outflow. */
export type RailKind = 'flowLine' | 'impervious' | 'phreaticLine' | 'freeFace';

/** A line along the flow from one head line of a strip to the next. Distances and places in working pixels. */
export type Rail = {
  /** Id of the traced line; where a way leads over several, of the one on which the line before ends. */
  readonly id: string;
  readonly kind: RailKind;
  /** Which edge of the strip it is, seen along the flow; null between the edges. */
  readonly edge: 'left' | 'right' | null;
  /** Where it leaves the line before and reaches the line after, along the strip's shapes. */
  readonly sBefore: number;
  readonly sAfter: number;
  /** From the line before to the line after, both ends included. */
  readonly points: readonly Pair[];
};

/** The rails of a strip from left to right along the flow. */
export type StripRails = {
  readonly rails: readonly Rail[];
  /** True when the shapes of the strip run from left to right. */
  readonly leftFirst: boolean;
  /** Where flow lines meet only one of the two head lines: distances along the line before, and along the line after. */
  readonly brokenBefore: readonly number[];
  readonly brokenAfter: readonly number[];
};

/** What closes the two ends of a strip: the traced line, or null where none does. Index as in `Strip.ways`. */
export type StripEnds = readonly [StripEnd | null, StripEnd | null];
export type StripEnd = { readonly id: string; readonly kind: RailKind };

/**
 * The rails of one strip: the traced flow lines that lead from one of its head lines to the other, and the traced
 * boundaries that close its ends. A straight join where nothing is traced is no rail. `slack`: how far a flow line may
 * run from a boundary and still be that boundary traced once more; `reach`: how far it may stop short of a potential
 * boundary. Shapes, `slack` and `reach` in working pixels.
 */
export function railsOf(
  strip: Strip,
  flowLines: readonly NetLine[],
  ends: StripEnds,
  slack: number,
  reach: number,
): StripRails {
  const leftFirst = signedArea(strip.ring) > 0;
  const edges = ends.flatMap((end, i) => edgeRail(strip, end, i, leftFirst));
  const brokenBefore: number[] = [];
  const brokenAfter: number[] = [];
  const inner = flowLines.flatMap((line): Rail[] => {
    if (ends.some((end) => end?.id === line.id)) return [];
    const places = meetingPair(line.shape, strip, reach);
    if (places.before === null || places.after === null) {
      if (places.before !== null) brokenBefore.push(places.before.s);
      if (places.after !== null) brokenAfter.push(places.after.s);
      return [];
    }
    const sBefore = places.before.s;
    const sAfter = places.after.s;
    if (edges.some((edge) => isAlong(edge, sBefore, sAfter, slack))) return [];
    const points = pieceOf(line.shape, places.before.t, places.after.t);
    return [{ id: line.id, kind: 'flowLine', edge: null, sBefore, sAfter, points }];
  });
  const sorted = [...edges, ...inner].sort((a, b) => a.sBefore - b.sBefore || a.sAfter - b.sAfter);
  return { rails: leftFirst ? sorted : sorted.reverse(), leftFirst, brokenBefore, brokenAfter };
}

function edgeRail(strip: Strip, end: StripEnd | null, index: number, leftFirst: boolean): Rail[] {
  const way = strip.ways[index];
  if (end === null || way === undefined || way.open) return [];
  const isFirst = index === 0;
  return [
    {
      id: end.id,
      kind: end.kind,
      edge: isFirst === leftFirst ? 'left' : 'right',
      sBefore: isFirst ? 0 : lengthOf(strip.beforeShape),
      sAfter: isFirst ? 0 : lengthOf(strip.afterShape),
      points: way.points,
    },
  ];
}

function isAlong(edge: Rail, sBefore: number, sAfter: number, slack: number): boolean {
  return Math.abs(edge.sBefore - sBefore) <= slack && Math.abs(edge.sAfter - sAfter) <= slack;
}

type Meeting = { readonly s: number; readonly t: number };

/** Where a flow line meets both head lines of a strip; of several pairs of meetings the one with the shortest piece between. */
function meetingPair(
  line: Polyline,
  strip: Strip,
  reach: number,
): { before: Meeting | null; after: Meeting | null } {
  const before = meetingsWith(strip.beforeShape, line, reach);
  const after = meetingsWith(strip.afterShape, line, reach);
  let best: { before: Meeting | null; after: Meeting | null } = {
    before: before[0] ?? null,
    after: after[0] ?? null,
  };
  let shortest = Number.POSITIVE_INFINITY;
  for (const from of before) {
    for (const to of after) {
      const length = Math.abs(to.t - from.t);
      if (length >= shortest) continue;
      shortest = length;
      best = { before: from, after: to };
    }
  }
  return best;
}

/** Crossings of a head line with a flow line; where there is none, an end of the flow line that stops just short of it. */
function meetingsWith(shape: Polyline, line: Polyline, reach: number): Meeting[] {
  const crossings = crossingsOf(shape, line);
  if (crossings.length > 0) return crossings;
  const tips = [[firstOf(line), 0] as const, [lastOf(line), lengthOf(line)] as const];
  return tips.flatMap(([tip, t]) => {
    const { box } = shape;
    if (tip[0] < box.minX - reach || tip[0] > box.maxX + reach) return [];
    if (tip[1] < box.minY - reach || tip[1] > box.maxY + reach) return [];
    const place = nearestOnPolyline(shape, ...tip);
    return place.distance <= reach ? [{ s: place.s, t }] : [];
  });
}
