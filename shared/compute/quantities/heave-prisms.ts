import { halfWidth, weightedSum } from '#shared/compute/doubt/contributions.ts';
import { outletDoubt } from '#shared/compute/doubt/point-doubt.ts';
import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import {
  firstOf,
  lastOf,
  nearestOnPolyline,
  type Polyline,
  pointAlong,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { headAtPlace, type PlaceHead } from '#shared/compute/profiles/place-head.ts';
import { saturatedUnitWeight } from '#shared/compute/quantities/gradients.ts';
import { heaveFactor, meanOverBase } from '#shared/compute/quantities/heave.ts';
import { wallTip } from '#shared/compute/quantities/wall-tip.ts';
import type { HeaveReading } from '#shared/contract/reading-quantities.ts';

/** A wall beside an outlet, natural section: where it enters the bed, its tip, and the side on which the prism lies. */
type Wall = {
  readonly wall: string;
  readonly outlet: Potential;
  readonly bed: Pair;
  readonly tip: Pair;
  readonly side: 1 | -1;
};

/** A depth below so many tracing accuracies is no wall. */
const LEAST_ACCURACIES = 10;
/** The prism's width over its depth. Source: Terzaghi (1922). */
const WIDTH_PART = 0.5;
/** Ground that falls by no more than 1 in 20 counts as level. */
const LEVEL_SLOPE = 0.05;

/**
 * The prisms of soil that may heave beside walls at which water leaves through a submerged bed: depth D of the wall's
 * tip below the bed, width D/2, and the mean excess head h − h_out on their base at the level of the tip, by the heads
 * of the net. The factor is γ'·D/(γw·h_m), given under level ground only. Empty while the net is not finished. Source:
 * Terzaghi (1922). Never throws.
 */
export function heavePrisms(prepared: PreparedNet): HeaveReading[] {
  if (!prepared.finished) return [];
  return wallsAtOutlets(prepared)
    .map((wall) => prismBeside(wall, prepared))
    .filter(({ at, depth, width }) => [...at, depth, width].every(Number.isFinite));
}

function wallsAtOutlets({ model, frame, ground }: PreparedNet): Wall[] {
  const beds = model.potentials.filter(
    ({ role, line }) => role === 'outlet' && line.kind === 'submergedFace',
  );
  const accuracy = ground.tracingAccuracyPx;
  const natural = ([x, y]: Pair): Pair => {
    const [offset, elevation] = frame.map.toSection(sheetPx(x, y));
    return [offset, elevation];
  };
  const lines = linesOfKind(model.lines, 'impervious');
  return lines.flatMap((line) => {
    const others = lines.filter((other) => other !== line).map(({ shape }) => shape);
    const tipGround = { others, accuracyPx: accuracy, reach: model.reach, natural };
    return beds.flatMap((outlet) =>
      bedEnds(outlet.shape).flatMap(({ end, inward }): Wall[] => {
        const foot = nearestOnPolyline(line.shape, end[0], end[1]);
        if (foot.distance > model.reach) return [];
        const bed = natural(end);
        const tip = wallTip(line.shape, foot.s, tipGround);
        const least = LEAST_ACCURACIES * accuracy * frame.map.elevationPerPx;
        if (tip === null || !(bed[1] - tip[1] > least)) return [];
        return [{ wall: line.id, outlet, bed, tip, side: natural(inward)[0] >= bed[0] ? 1 : -1 }];
      }),
    );
  });
}

function bedEnds(shape: Polyline): Array<{ end: Pair; inward: Pair }> {
  const middle = pointAlong(shape, shape.cum[shape.cum.length - 1]! / 2);
  return [
    { end: firstOf(shape), inward: middle },
    { end: lastOf(shape), inward: middle },
  ];
}

function prismBeside(wall: Wall, prepared: PreparedNet): HeaveReading {
  const { frame, ground, soils } = prepared;
  const depth = wall.bed[1] - wall.tip[1];
  const width = WIDTH_PART * depth;
  const [tipX, tipY] = frame.toSheet(frame.map.toSheet(sectionPt(...wall.tip)));
  const headAt = (part: number) => {
    const place = sectionPt(wall.tip[0] + wall.side * part * width, wall.tip[1]);
    return headAtPlace(frame.map.toSheet(place), ground, { id: wall.wall, typed: false });
  };
  const mean = meanOverBase((part) => {
    const head = headAt(part);
    return head.status === 'read' ? head.totalHead - wall.outlet.outHead : null;
  });
  const inside = sectionPt(wall.tip[0] + (wall.side * width) / 2, wall.tip[1] + depth / 2);
  const [x, y] = frame.map.toSheet(inside);
  const saturated = saturatedUnitWeight(soils.soilAt(x, y).value, ground.gammaW);
  const about = {
    wall: wall.wall,
    outlet: wall.outlet.id,
    at: [tipX, tipY] as [number, number],
    depth,
    width,
    meanExcessHead: mean,
    meanExcessHeadPlusMinus: mean === null ? null : meanPlusMinus(headAt, ground),
  };
  const note = reasonAgainst(wall, width, mean, saturated, prepared);
  if (note !== '' || mean === null || saturated === null) return { ...about, factor: null, note };
  return { ...about, factor: heaveFactor(saturated - ground.gammaW, depth, mean, ground.gammaW), note };
}

const DOUBT_PIECES = 8;

/** Half-width (95 %) of the mean head over the base less the outlet's: what all places share is kept together. */
function meanPlusMinus(headAt: (part: number) => PlaceHead, ground: ReadingGround): number | null {
  const places = Array.from({ length: DOUBT_PIECES }, (_, i) => headAt((i + 0.5) / DOUBT_PIECES));
  const doubts = places.map((head) => (head.status === 'read' ? head.doubt().totalHead : []));
  const { datumPlusMinus } = ground.doubt.water;
  const datum = [{ cause: 'datum', source: 'datum' as const, amount: datumPlusMinus ?? 0 }];
  const plusMinus = halfWidth(
    weightedSum([
      ...doubts.map((doubt) => [1 / DOUBT_PIECES, doubt] as const),
      [-1, outletDoubt(ground.doubt)],
      [-1, datum],
    ]),
  );
  return Number.isFinite(plusMinus) ? plusMinus : null;
}

function reasonAgainst(
  wall: Wall,
  width: number,
  mean: number | null,
  saturated: number | null,
  { frame, ground }: PreparedNet,
): string {
  if (mean === null)
    return 'The base of the prism lies partly outside the traced net. Trace the net as far as half the depth of the wall beside its tip.';
  if (!isLevelOver(wall, width, frame.map))
    return 'The bed slopes or ends above the prism: its weight is not that of a prism under level ground.';
  if (saturated === null) return 'Enter the saturated unit weight of the soil, or its Gs and e.';
  if (!(saturated > ground.gammaW))
    return 'The soil is entered as no heavier than water. Check its unit weight.';
  return mean > 0 ? '' : 'No excess head acts on the base of the prism.';
}

/** True when the bed over the whole width of the prism stays within the level slope. */
function isLevelOver({ outlet, bed, side }: Wall, width: number, map: PreparedNet['frame']['map']): boolean {
  const places = verticesOf(outlet.shape).map(([x, y]) => map.toSection(sheetPx(x, y)));
  const above = places.filter(([offset]) => side * (offset - bed[0]) <= width);
  const farthest = Math.max(...places.map(([offset]) => side * (offset - bed[0])));
  return (
    farthest >= width && above.every(([, elevation]) => Math.abs(elevation - bed[1]) <= LEVEL_SLOPE * width)
  );
}
