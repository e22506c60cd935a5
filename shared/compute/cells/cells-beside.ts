import { measureCell } from '#shared/compute/cells/quadrilateral.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  boxesMeet,
  firstOf,
  lastOf,
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pieceOf,
  pointAlong,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** The two families of a flow net: lines along which the head is one, and lines along which water flows. */
export type NetFamily = 'head' | 'flow';

/** A line of the net in working pixels. */
export type FamilyLine = { readonly id: string; readonly family: NetFamily; readonly shape: Polyline };

/** A cell at one side of a line that is being drawn. */
export type CellBeside = {
  /** The neighbouring line of the same family that closes it, and the two lines of the other family. */
  readonly neighbour: string;
  readonly rails: readonly [string, string];
  /** On which hand it lies, going along the line with y downwards as on the sheet. */
  readonly side: 'left' | 'right';
  /** B/L: mean width across the flow over mean length along it. */
  readonly ratio: number;
};

/** Where a line meets another: distances along the first and along the other. */
type Meeting = { readonly s: number; readonly t: number };
type RailMeeting = Meeting & { readonly rail: FamilyLine };

/** A direction is taken over this part of a line's length to either side. */
const CHORD_PART = 1e-3;

/**
 * The cells that a line closes with its neighbours, at most one to either side, at the distance `at` along it: between
 * the two lines of the other family that it meets next before and after `at`, or met last where it goes no farther.
 * `lines`: the finished lines of both families, without the drawn one. `reach`: how far a line may stop short of one it
 * is meant to meet. All in working pixels. None where the line does not meet two lines of the other family, or no
 * neighbour meets the same two. Each is measured as the cells of the net check are, see `measureCell`.
 */
export function cellsBeside(
  drawn: { readonly family: NetFamily; readonly shape: Polyline },
  at: number,
  lines: readonly FamilyLine[],
  reach: number,
): CellBeside[] {
  const rails = lines
    .filter(({ family }) => family !== drawn.family)
    .flatMap((rail) => meetingsOf(drawn.shape, rail.shape, reach).map((met) => ({ ...met, rail })))
    .sort((a, b) => a.s - b.s);
  const pair = pairAbout(rails, at, reach);
  if (pair === null) return [];
  const own = lines.filter(({ family }) => family === drawn.family);
  const sides = [1, -1].map((side) => cellAt(drawn, pair, own, side, reach));
  return sides.filter((cell) => cell !== null);
}

/** The meetings next before and after `at`, of two different lines; the last two where the line ends between lines. */
function pairAbout(
  met: readonly RailMeeting[],
  at: number,
  reach: number,
): readonly [RailMeeting, RailMeeting] | null {
  // A line that touches the same rail several times within reach meets it once.
  const once = met.filter((here, i) => i === 0 || here.rail.id !== met[i - 1]!.rail.id);
  const after = once.findIndex(({ s }) => s >= at - reach);
  const i = after === -1 ? once.length - 1 : Math.max(1, after);
  const [from, to] = [once[i - 1], once[i]];
  return from === undefined || to === undefined ? null : [from, to];
}

/** All meetings of a line with another: crossings, else an end of either that stops just short of the other. */
function meetingsOf(line: Polyline, other: Polyline, reach: number): Meeting[] {
  if (!boxesMeet(line.box, other.box, reach)) return [];
  const crossings = crossingsOf(line, other);
  if (crossings.length > 0) return crossings.map(({ s, t }) => ({ s, t }));
  return [
    ...endsNear(line, other, reach),
    ...endsNear(other, line, reach).map(({ s, t }) => ({ s: t, t: s })),
  ];
}

type Kept = { readonly reach: number; readonly met: readonly Meeting[] };
const kept = new WeakMap<Polyline, WeakMap<Polyline, Kept>>();

/** As `meetingsOf`, of two lines that stay: asked again at every movement of the pointer, for as long as they last. */
function keptMeetings(line: Polyline, other: Polyline, reach: number): readonly Meeting[] {
  const ofLine = kept.get(line) ?? new WeakMap<Polyline, Kept>();
  kept.set(line, ofLine);
  const known = ofLine.get(other);
  if (known?.reach === reach) return known.met;
  const met = meetingsOf(line, other, reach);
  ofLine.set(other, { reach, met });
  return met;
}

function endsNear(line: Polyline, other: Polyline, reach: number): Meeting[] {
  const ends = [[firstOf(line), 0] as const, [lastOf(line), lengthOf(line)] as const];
  return ends.flatMap(([[x, y], s]) => {
    if (!boxesMeet(other.box, { minX: x, maxX: x, minY: y, maxY: y }, reach)) return [];
    const place = nearestOnPolyline(other, x, y);
    return place.distance <= reach ? [{ s, t: place.s }] : [];
  });
}

/** The cell at one side: closed by the neighbour that both rails reach soonest there. */
function cellAt(
  drawn: { readonly family: NetFamily; readonly shape: Polyline },
  [first, second]: readonly [RailMeeting, RailMeeting],
  own: readonly FamilyLine[],
  side: number,
  reach: number,
): CellBeside | null {
  const ways = [first, second].map((met) => side * turnAt(drawn.shape, met));
  let nearest: { readonly line: FamilyLine; readonly at: [number, number]; readonly away: number } | null =
    null;
  for (const line of own) {
    const a = soonest(line, first, ways[0]!, reach);
    const b = a === null ? null : soonest(line, second, ways[1]!, reach);
    if (a === null || b === null) continue;
    const away = Math.abs(a - first.t) + Math.abs(b - second.t);
    if (nearest === null || away < nearest.away) nearest = { line, at: [a, b], away };
  }
  if (nearest === null) return null;
  const [a, b] = nearest.at;
  const between = pieceOf(drawn.shape, first.s, second.s);
  const left = pieceOf(first.rail.shape, first.t, a);
  const right = pieceOf(second.rail.shape, second.t, b);
  const opposite = pieceBetween(nearest.line.shape, left.at(-1)!, right.at(-1)!);
  const { length, width } = measureCell({ before: between, after: opposite, left, right });
  if (!(length > 0 && width > 0)) return null;
  return {
    neighbour: nearest.line.id,
    rails: [first.rail.id, second.rail.id],
    side: side > 0 ? 'right' : 'left',
    ratio: drawn.family === 'head' ? width / length : length / width,
  };
}

/** 1 where the rail passes the line from its left to its right hand, −1 the other way (y downwards); 0 along it. */
function turnAt(line: Polyline, { s, t, rail }: RailMeeting): number {
  const [ax, ay] = directionAt(line, s);
  const [bx, by] = directionAt(rail.shape, t);
  return Math.sign(ax * by - ay * bx);
}

function directionAt(line: Polyline, s: number): Pair {
  const by = CHORD_PART * lengthOf(line);
  const [ax, ay] = pointAlong(line, s - by);
  const [bx, by2] = pointAlong(line, s + by);
  return [bx - ax, by2 - ay];
}

/** Distance along a rail at which it meets a line soonest, going from where it meets the drawn one in direction `way`. */
function soonest(line: FamilyLine, { rail, t }: RailMeeting, way: number, reach: number): number | null {
  let best: number | null = null;
  for (const met of keptMeetings(rail.shape, line.shape, reach)) {
    const ahead = (met.s - t) * way;
    if (ahead > reach && (best === null || ahead < Math.abs(best - t))) best = met.s;
  }
  return best;
}

/** The piece of a line between the places nearest to two others, from the first to the second. */
function pieceBetween(line: Polyline, from: Pair, to: Pair): Pair[] {
  return pieceOf(line, nearestOnPolyline(line, ...from).s, nearestOnPolyline(line, ...to).s);
}
