import { type CellBeside, cellsBeside } from '#shared/compute/cells/cells-beside.ts';
import { familyOf, meetingAngle, wantsRightAngle } from '#shared/compute/cells/right-angles.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  boxesMeet,
  nearestOnPolyline,
  type Polyline,
  polylineFromFlat,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { IDENTITY, type LinearMap, mapped } from '#shared/compute/linear-map.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument, LineKind, SheetPoint, TracedLine } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { HideableKind } from './desk-state.ts';
import { type NetLinesSeen, netLinesSeen, type SeenLine, shapeThrough } from './net-lines-seen.ts';
import { isBoundaryKind } from './sheet-kinds.ts';

/** A line that is being drawn or dragged: its points as they would be, and which of them follows the pointer. */
export type LineInHand = {
  readonly id: string;
  readonly value: TracedLine;
  readonly points: readonly SheetPoint[];
  readonly index: number;
};

/** Where the segment to the pointer meets another line. */
export type MeetingSeen = {
  readonly kind: LineKind;
  readonly angleDeg: number;
  /** False where the two may meet at any angle. */
  readonly wantsRight: boolean;
};

export type CellSeen = Pick<CellBeside, 'side' | 'ratio'>;

/** What is told of a line while it is drawn; angles and cells are those of the section in which nets are judged. */
export type LiveHelp = {
  readonly meetings: readonly MeetingSeen[];
  readonly cells: readonly CellSeen[];
  /** B/L that cells are drawn for; null where it differs from soil to soil. */
  readonly wantedRatio: number | null;
};

export const NO_HELP: LiveHelp = { meetings: [], cells: [], wantedRatio: null };

type About = {
  readonly document: FlowNetDocument;
  readonly reading: Pick<NetReading, 'frame' | 'soils'> | null;
  readonly hiddenKinds: readonly HideableKind[];
};

/** A shorter piece of a line drawn freehand tells how the hand trembled, and no direction. Sheet pixels. */
const LEAST_SEGMENT_PX = 12;
/** Most angles told at once: those at both ends of a segment. */
const MOST_MEETINGS = 2;

/**
 * The angles at which the segments at the point in hand meet other lines, the nearest to it first, and the cells that the
 * line closes beside it. Where the soils share no transformed section neither right angles nor cells are asked for.
 */
export function liveHelpOf(hand: LineInHand, { document, reading, hiddenKinds }: About): LiveHelp {
  const map: LinearMap = reading?.frame?.matrix ?? IDENTITY;
  const isJudged = reading?.frame?.kind !== 'none';
  const { tracingAccuracyPx: accuracyPx, cellRatio } = singleInputs(document).count;
  const reach = Math.max(2, 2 * accuracyPx);
  const net = netLinesSeen(document, hand.id, map, reach);
  const shape = shapeThrough(hand.points, map);
  const at = hand.points[hand.index];
  if (shape === null || at === undefined) return NO_HELP;
  const shown = net.lines.filter(({ value }) => !hiddenKinds.includes(value.line));
  const meetings = meetingsAt(hand, shown, map, reach, accuracyPx).map((meeting) => ({
    ...meeting,
    wantsRight: meeting.wantsRight && isJudged,
  }));
  const soils = reading?.soils?.expectedRatios.length ?? 0;
  return {
    meetings,
    cells: isJudged ? cellsAt(hand, shape, mapped(map, ...at), net, reach) : [],
    wantedRatio: soils > 1 ? null : cellRatio,
  };
}

function cellsAt(hand: LineInHand, shape: Polyline, at: Pair, net: NetLinesSeen, reach: number): CellSeen[] {
  const family = familyOf(hand.value.line);
  if (family === null) return [];
  return cellsBeside({ family, shape }, nearestOnPolyline(shape, ...at).s, net.families, reach).map(
    ({ side, ratio }) => ({ side, ratio }),
  );
}

type Met = MeetingSeen & { readonly away: number; readonly id: string };

/** Meetings of the one or two segments that end at the point in hand, each line once. */
function meetingsAt(
  { value, points, index }: LineInHand,
  lines: readonly SeenLine[],
  map: LinearMap,
  reach: number,
  accuracyPx: number,
): MeetingSeen[] {
  const tip = mapped(map, ...points[index]!);
  const met: Met[] = [];
  for (const step of [-1, 1]) {
    const neighbour = pointBeside(points, index, step);
    const from = neighbour === null ? null : mapped(map, ...neighbour);
    if (from === null || (from[0] === tip[0] && from[1] === tip[1])) continue;
    const segment = polylineFromFlat(Float64Array.of(...from, ...tip));
    const along: Pair = [tip[0] - from[0], tip[1] - from[1]];
    for (const line of lines) {
      const at = boxesMeet(line.shape.box, segment.box, reach)
        ? placeMet(segment, line.shape, tip, from, reach)
        : null;
      if (at === null) continue;
      met.push({
        id: line.id,
        kind: line.value.line,
        angleDeg: meetingAngle(along, line.shape, at, isBoundaryKind(line.value.line), accuracyPx),
        wantsRight: wantsRightAngle(value, line.value),
        away: Math.hypot(at[0] - tip[0], at[1] - tip[1]),
      });
    }
  }
  met.sort((a, b) => a.away - b.away);
  const once = met.filter(({ id }, i) => met.findIndex((other) => other.id === id) === i);
  return once
    .slice(0, MOST_MEETINGS)
    .map(({ kind, angleDeg, wantsRight }) => ({ kind, angleDeg, wantsRight }));
}

/**
 * The next point of a line, or where its points are dense the first that is far enough away to give a direction; null at
 * its end. `step`: −1 backwards, 1 onwards.
 */
function pointBeside(points: readonly SheetPoint[], index: number, step: number): SheetPoint | null {
  const [x, y] = points[index]!;
  let found: SheetPoint | null = null;
  for (let i = index + step; i >= 0 && i < points.length; i += step) {
    found = points[i]!;
    if (Math.hypot(found[0] - x, found[1] - y) >= LEAST_SEGMENT_PX) break;
  }
  return found;
}

/** Where a segment meets a line: the crossing nearest to its tip, else the end that lies on the line to within reach. */
function placeMet(segment: Polyline, line: Polyline, tip: Pair, from: Pair, reach: number): Pair | null {
  const crossing = crossingsOf(segment, line).at(-1);
  if (crossing !== undefined) return crossing.at;
  for (const end of [tip, from]) {
    const place = nearestOnPolyline(line, ...end);
    if (place.distance <= reach) return place.at;
  }
  return null;
}
