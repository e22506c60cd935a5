import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  lengthOf,
  type Polyline,
  pieceOf,
  pointAlong,
  polylineOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { type Tangent, tangentOfBoundary, tangentOfCurve } from '#shared/compute/net-check/tangent.ts';
import {
  backwards,
  type Refraction,
  refracted,
  refractionOfFlow,
  refractionOfHeads,
  sensitivityOf,
} from '#shared/compute/soils/refraction.ts';
import type { Soil, Tensor } from '#shared/compute/soils/soil-list.ts';

/** A line of the net that may cross soil boundaries; one frame's pixels. */
export type CrossingLine = { readonly id: string; readonly isFlow: boolean; readonly shape: Polyline };
export type Interface = { readonly id: string; readonly shape: Polyline };

/** How a line bends where it passes from one soil to another; angles in degrees from the normal of the boundary. */
export type InterfaceCrossing = {
  readonly lineId: string;
  readonly boundaryId: string;
  readonly at: Pair;
  readonly from: Soil;
  readonly to: Soil;
  readonly drawnDeg: number;
  readonly expectedDeg: number;
  /** Drawn less expected, 0 to 90 degrees, and what the hand's tremor makes of it (95 %). */
  readonly departureDeg: number;
  readonly toleranceDeg: number;
};

/** What crossings are judged by. */
export type InterfaceGround = {
  readonly soilAt: (x: number, y: number) => Soil;
  readonly tensorOf: (soil: Soil) => Tensor | null;
  /** Length of line on either side that tells a direction, and the tracing accuracy; pixels. */
  readonly window: number;
  readonly accuracyPx: number;
};

/** A line this much along the boundary, as the cosine to its normal, is not refracted but follows it. */
const ALONG = 0.05;

/**
 * Every crossing of a line with a boundary between two soils of known permeability, with the direction drawn past it and
 * the one that follows from before it (or the other way round, whichever the tremor moves less).
 */
export function interfaceCrossings(
  lines: readonly CrossingLine[],
  boundaries: readonly Interface[],
  ground: InterfaceGround,
): InterfaceCrossing[] {
  return lines.flatMap((line) => {
    const places = boundaries
      .flatMap((boundary) =>
        crossingsOf(line.shape, boundary.shape).map(({ s, t, at }) => ({ boundary, s, t, at })),
      )
      .sort((a, b) => a.s - b.s);
    const stops = [0, ...places.map(({ s }) => s), lengthOf(line.shape)];
    return places
      .map((place, i) =>
        crossingAt(line, place, Math.min(place.s - stops[i]!, stops[i + 2]! - place.s), ground),
      )
      .filter((crossing) => crossing !== null);
  });
}

type Place = { boundary: Interface; s: number; t: number; at: Pair };

function crossingAt(
  line: CrossingLine,
  { boundary, s, t, at }: Place,
  room: number,
  ground: InterfaceGround,
): InterfaceCrossing | null {
  const window = Math.min(room, ground.window);
  if (!(window > 2 * ground.accuracyPx)) return null;
  const from = ground.soilAt(...pointAlong(line.shape, s - window / 2));
  const to = ground.soilAt(...pointAlong(line.shape, s + window / 2));
  const [k1, k2] = [ground.tensorOf(from), ground.tensorOf(to)];
  if (from === to || k1 === null || k2 === null) return null;
  const tangent = tangentOfBoundary(boundary.shape, t, window, ground.accuracyPx);
  const before = sideOf(line.shape, s, s - window, tangent, ground.accuracyPx);
  const after = sideOf(line.shape, s, s + window, tangent, ground.accuracyPx);
  if (before === null || after === null) return null;
  const law = (line.isFlow ? refractionOfFlow : refractionOfHeads)(k1, k2, tangent.direction);
  const judgement = judged(law, before, after, tangent);
  if (!Object.values(judgement).every(Number.isFinite)) return null;
  return { lineId: line.id, boundaryId: boundary.id, at, from, to, ...judgement };
}

type Side = { readonly alpha: number; readonly tremor: number };

/** Angle of a line to the normal on one side of a crossing, radians; null along the boundary. */
function sideOf(
  shape: Polyline,
  s: number,
  until: number,
  { direction: [tx, ty] }: Tangent,
  accuracyPx: number,
): Side | null {
  const piece = polylineOf(pieceOf(shape, s, until));
  if (piece === null) return null;
  const { direction, tremor } = tangentOfCurve(piece, 0, lengthOf(piece), accuracyPx);
  const along = direction[0] * tx + direction[1] * ty;
  const across = -direction[0] * ty + direction[1] * tx;
  if (Math.abs(across) < ALONG) return null;
  return { alpha: Math.atan(along / across), tremor };
}

function judged(law: Refraction, before: Side, after: Side, tangent: Tangent) {
  const forwards = Math.abs(sensitivityOf(law, before.alpha)) <= 1;
  const [known, drawn] = forwards ? [before, after] : [after, before];
  const used = forwards ? law : backwards(law);
  const turn = sensitivityOf(used, known.alpha);
  const expected = refracted(used, known.alpha);
  const apart = Math.abs(drawn.alpha - expected);
  const spread = Math.hypot(turn * known.tremor, drawn.tremor, (1 - turn) * tangent.tremor);
  const degrees = 180 / Math.PI;
  return {
    drawnDeg: drawn.alpha * degrees,
    expectedDeg: expected * degrees,
    departureDeg: Math.min(apart, Math.PI - apart) * degrees,
    toleranceDeg: 2 * spread * degrees,
  };
}
