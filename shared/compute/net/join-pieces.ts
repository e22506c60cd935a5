import { makeFinding } from '#shared/compute/findings.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import {
  distanceToPolyline,
  lengthOf,
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
  const tips = whole.map(({ line }) => tipsOf(line.shape));
  for (let i = 0; i < whole.length; i += 1) {
    for (let j = i + 1; j < whole.length; j += 1) {
      const meeting = meetingTips(tips[i]!, tips[j]!, reach);
      const joined = meeting && joinedPair(whole[i]!, whole[j]!, meeting, boundaries, reach);
      if (joined === null) continue;
      whole[i] = joined.whole;
      tips[i] = tipsOf(joined.whole.line.shape);
      whole.splice(j, 1);
      tips.splice(j, 1);
      findings.push(joinNote(joined.whole.members, joined.at));
      // The longer piece may meet one that was passed over before.
      j = i;
    }
  }
  return { whole, findings };
}

/** Each of two facing ends would run on to the other within this many degrees. */
const FACING_DEG = 30;

/**
 * Pieces of what looks like one equipotential with a gap between them, no longer than the shorter piece: their ends face
 * one another, away from every boundary. `inDoubt`: lines that found no place in the order; a gap beside one of them
 * withholds the figures. Shapes and `reach` in working pixels.
 */
export function offerToJoin(
  whole: readonly WholeLine[],
  boundaries: readonly Polyline[],
  reach: number,
  inDoubt: ReadonlySet<string>,
): Finding[] {
  const isFree = ({ at }: Tip) => !boundaries.some((shape) => distanceToPolyline(shape, ...at) <= reach);
  const ended = whole.map(({ line }) => ({
    id: line.id,
    length: lengthOf(line.shape),
    tips: tipsOf(line.shape),
  }));
  return ended.flatMap((a, i) =>
    ended.slice(i + 1).flatMap((b): Finding[] => {
      const most = Math.min(a.length, b.length);
      const facing = a.tips.find((tip) =>
        b.tips.some((other) => face(tip, other, most) && isFree(tip) && isFree(other)),
      );
      if (facing === undefined) return [];
      return [offer([a.id, b.id], facing.at, inDoubt.has(a.id) || inDoubt.has(b.id))];
    }),
  );
}

/** True when each of two ends would run on to the other. */
function face(a: Tip, b: Tip, most: number): boolean {
  const gap: Pair = [b.at[0] - a.at[0], b.at[1] - a.at[1]];
  const size = lengthOfVector(...gap);
  if (!(size > 0) || size > most) return false;
  const least = size * Math.cos((FACING_DEG * Math.PI) / 180);
  const along = a.onward[0] * gap[0] + a.onward[1] * gap[1];
  const against = -(b.onward[0] * gap[0] + b.onward[1] * gap[1]);
  return along >= least && against >= least;
}

function offer(ids: readonly string[], at: Pair, withholds: boolean): Finding {
  return makeFinding(
    withholds ? 'wrong' : 'question',
    'lineInPieces',
    'Two equipotentials look like the pieces of one with a gap here. Extend one to the end of the other, and they are read as one line.',
    { cell: 'netCheck', entityIds: ids, at },
  );
}

type Tip = { readonly at: Pair; readonly onward: Pair; readonly isFirst: boolean };

/** The two ends by which one piece runs on as the other. */
function meetingTips(a: readonly Tip[], b: readonly Tip[], reach: number): readonly [Tip, Tip] | null {
  for (const tipA of a) {
    for (const tipB of b) if (runsOn(tipA, tipB, reach)) return [tipA, tipB];
  }
  return null;
}

function joinedPair(
  a: WholeLine,
  b: WholeLine,
  [tipA, tipB]: readonly [Tip, Tip],
  boundaries: readonly Polyline[],
  reach: number,
): { whole: WholeLine; at: Pair } | null {
  const value = commonValue(a.line, b.line);
  const nearBoundary = boundaries.some((shape) => distanceToPolyline(shape, ...tipA.at) <= reach);
  const shape = nearBoundary ? null : polylineOf(pointsThrough(a.line.shape, tipA, b.line.shape, tipB));
  if (value === null || shape === null) return null;
  const line = { ...a.line, value, shape };
  return { whole: { line, members: [...a.members, ...b.members] }, at: tipA.at };
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
    const size = lengthOfVector(at[0] - from[0], at[1] - from[1]) || 1;
    return { at, onward: [(at[0] - from[0]) / size, (at[1] - from[1]) / size], isFirst };
  };
  return [tip(0, DIRECTION_PART * length, true), tip(length, (1 - DIRECTION_PART) * length, false)];
}

function runsOn(a: Tip, b: Tip, reach: number): boolean {
  if (lengthOfVector(a.at[0] - b.at[0], a.at[1] - b.at[1]) > reach) return false;
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
