import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { pointAlong } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { lieOf } from '#shared/compute/net/lie-of-place.ts';
import { netLinesOf } from '#shared/compute/net/net-lines.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { findTangles } from '#shared/compute/net/tangles.ts';
import { handAt } from '#shared/compute/net/two-readings.ts';
import { placedPoints, prepareNet } from '#shared/compute/prepare-net.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

/** How hand's rule reads a point, to be drawn: all places in base-raster pixels of the sheet. */
export type PointWays = {
  /** Outline of the ground between the two neighbouring lines, not closed by a repeated place. */
  readonly strip: readonly Pair[];
  /** The shortest ways from the point to the line before and to the line after, corners of walls included. */
  readonly toBefore: readonly Pair[];
  readonly toAfter: readonly Pair[];
  /** Part of the interval passed, toBefore over both ways as they are measured in the section that is judged. */
  readonly fraction: number;
};

/**
 * The two shortest ways and the strip by which `readNet` reads a point by hand's rule. In a transformed section the ways
 * are shortest there, and are straight on the sheet all the same, because the transformation is linear. Null where the
 * net is unfinished, the point is unknown or has no place, and where nothing is read by hand. Pure and total.
 */
export function pointWays(document: FlowNetDocument, pointId: string): PointWays | null {
  const setOut = readSetOut(document);
  const inputs = singleInputs(document);
  if (setOut.map === null) return null;
  if (findTangles(netLinesOf(document), inputs.count.tracingAccuracyPx).length > 0) return null;
  const prepared = prepareNet(document, setOut, setOut.map, inputs);
  if (!prepared.finished) return null;
  const point = placedPoints(prepared.working, prepared.frame.map).find(({ id }) => id === pointId);
  return point?.sheetAt ? waysAt(point.sheetAt, prepared.ground) : null;
}

function waysAt(at: SheetPx, ground: ReadingGround): PointWays | null {
  const lie = lieOf(at, ground);
  if (lie.in !== 'strip') return null;
  const hand = handAt(at, lie, ground);
  if ('code' in hand) return null;
  const { strip, beforeS, afterS, beforeCorners, afterCorners, fraction } = hand.way;
  const shown = (places: readonly Pair[]) => places.map(([x, y]) => ground.toSheet(sheetPx(x, y)));
  const { xy } = strip.ring;
  return {
    strip: shown(Array.from({ length: xy.length / 2 }, (_, i): Pair => [xy[2 * i]!, xy[2 * i + 1]!])),
    toBefore: shown([at, ...beforeCorners, pointAlong(strip.beforeShape, beforeS)]),
    toAfter: shown([at, ...afterCorners, pointAlong(strip.afterShape, afterS)]),
    fraction,
  };
}
