import { makeFinding } from '#shared/compute/findings.ts';
import {
  lengthOf,
  nearestOnPolyline,
  type Polyline,
  pointAlong,
  polylineOf,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** An equipotential as it is read: one traced line, or several pieces whose ends meet, the first piece's id for all. */
export type WholeLine = { readonly line: NetLine; readonly members: readonly string[] };

/** The last part of a piece says which way it would run on; the next piece runs on within this many degrees. */
const DIRECTION_PART = 0.1;
const MOST_TURN_DEG = 50;

/**
 * Joins equipotentials that are traced in pieces, so that two pieces of one line are not two drops. Ends belong together
 * when they lie within `reach` of one another, away from every boundary on which a line may end, and one piece runs on
 * as the other ends. Pieces with different typed values stay apart. A note tells what was joined. Shapes and `reach` in
 * working pixels; the answer does not depend on the direction of the pieces.
 */
export function joinPieces(
  traced: readonly NetLine[],
  boundaries: readonly Polyline[],
  reach: number,
): { whole: WholeLine[]; findings: Finding[] } {
  const whole: WholeLine[] = traced.map((line) => ({ line, members: [line.id] }));
  const findings: Finding[] = [];
  for (let i = 0; i < whole.length; i += 1) {
    for (let j = i + 1; j < whole.length; j += 1) {
      const joined = joinedPair(whole[i]!, whole[j]!, boundaries, reach);
      if (joined === null) continue;
      whole[i] = joined.whole;
      whole.splice(j, 1);
      findings.push(joinNote(joined.whole.members, joined.at));
      // The longer piece may meet one that was passed over before.
      j = i;
    }
  }
  return { whole, findings };
}

type Tip = { readonly at: Pair; readonly onward: Pair; readonly isFirst: boolean };

function joinedPair(
  a: WholeLine,
  b: WholeLine,
  boundaries: readonly Polyline[],
  reach: number,
): { whole: WholeLine; at: Pair } | null {
  const value = commonValue(a.line, b.line);
  if (value === null) return null;
  for (const tipA of tipsOf(a.line.shape)) {
    for (const tipB of tipsOf(b.line.shape)) {
      if (!runsOn(tipA, tipB, reach)) continue;
      const nearBoundary = boundaries.some((shape) => nearestOnPolyline(shape, ...tipA.at).distance <= reach);
      const shape = nearBoundary ? null : polylineOf(pointsThrough(a.line.shape, tipA, b.line.shape, tipB));
      if (shape === null) continue;
      const line = { ...a.line, value, shape };
      return { whole: { line, members: [...a.members, ...b.members] }, at: tipA.at };
    }
  }
  return null;
}

/** What is typed for both together; null when it contradicts itself. */
function commonValue({ value: a }: NetLine, { value: b }: NetLine): NetLine['value'] | null {
  const agree = (one: number | null, other: number | null) => one === null || other === null || one === other;
  if (!agree(a.head, b.head) || !agree(a.drops, b.drops)) return null;
  return { ...a, name: a.name || b.name, head: a.head ?? b.head, drops: a.drops ?? b.drops };
}

function tipsOf(shape: Polyline): [Tip, Tip] {
  const length = lengthOf(shape);
  const tip = (s: number, back: number, isFirst: boolean): Tip => {
    const at = pointAlong(shape, s);
    const from = pointAlong(shape, back);
    const size = Math.hypot(at[0] - from[0], at[1] - from[1]) || 1;
    return { at, onward: [(at[0] - from[0]) / size, (at[1] - from[1]) / size], isFirst };
  };
  return [tip(0, DIRECTION_PART * length, true), tip(length, (1 - DIRECTION_PART) * length, false)];
}

function runsOn(a: Tip, b: Tip, reach: number): boolean {
  if (Math.hypot(a.at[0] - b.at[0], a.at[1] - b.at[1]) > reach) return false;
  const along = -(a.onward[0] * b.onward[0] + a.onward[1] * b.onward[1]);
  return along >= Math.cos((MOST_TURN_DEG * Math.PI) / 180);
}

function pointsThrough(a: Polyline, tipA: Tip, b: Polyline, tipB: Tip): Pair[] {
  const toTip = tipA.isFirst ? verticesOf(a).reverse() : verticesOf(a);
  const fromTip = tipB.isFirst ? verticesOf(b) : verticesOf(b).reverse();
  return [...toTip, ...fromTip];
}

function joinNote(members: readonly string[], at: Pair): Finding {
  return makeFinding(
    'note',
    'piecesJoined',
    'The ends of two pieces of an equipotential meet here, and they are read as one line. If they are two lines, draw their ends to the boundaries.',
    { cell: 'netCheck', entityIds: members, at },
  );
}
