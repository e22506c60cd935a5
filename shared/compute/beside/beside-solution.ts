import { type DifferencePicture, differencePicture } from '#shared/compute/beside/difference-picture.ts';
import { type PlacedNet, placedNet } from '#shared/compute/beside/placed-net.ts';
import { type SheetPx, sectionPt } from '#shared/compute/frames.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import {
  compareWithIndependent,
  type IndependentComparison,
} from '#shared/compute/independent/compare-with-independent.ts';
import type { SectionOfDocument } from '#shared/compute/independent/section-of-document.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/**
 * The steepest place at which water comes out at one boundary, gradient positive outwards. Places nearer than a tenth of
 * the boundary to its ends and to corners at which the gradient has no bound are left out: there the size of the mesh
 * would decide it, at a floor edge by a power and where a face of free outflow meets an impervious base by a logarithm.
 */
export type SteepestExit = {
  readonly id: string;
  readonly at: SheetPoint;
  readonly gradient: number;
  /** True when the boundary has a corner at which the gradient has no bound. */
  readonly hasSingular: boolean;
};

/** A traced net beside the independent solution of its section: plain data. Lengths in the document's unit. */
export type BesideSolution = {
  readonly comparison: IndependentComparison;
  /** Greatest less least head of the solution. */
  readonly headLost: number;
  readonly hasPermeability: boolean;
  readonly usesPhreaticLine: boolean;
  readonly exits: readonly SteepestExit[];
  readonly net: PlacedNet;
  readonly picture: DifferencePicture;
  /** Mass balance: inflow less outflow over the inflow. */
  readonly imbalance: number;
  /** Bound of the relative error of the energy; null where the stream function has no single value. */
  readonly gap: number | null;
  readonly surfaceMisfit: number | null;
  readonly nodeCount: number;
};

/**
 * Sets the traced net beside the independent solution: heads and seepage compared, the steepest exits, the computed net
 * and the differences of head over the section, with their places on the sheet. `reading` is that of `document`, and
 * `section` and `solution` are of it too. Differences are traced minus independent. Null while the section is not set
 * out. Pure and total.
 */
export function besideSolution(
  document: FlowNetDocument,
  reading: NetReading,
  section: SectionOfDocument,
  solution: SectionSolution,
): BesideSolution | null {
  const { map } = readSetOut(document);
  if (map === null) return null;
  const toSheet = ([offset, elevation]: Pair): SheetPx => map.toSheet(sectionPt(offset, elevation));
  const { imbalance, gap, surfaceMisfit, nodeCount } = solution;
  return {
    comparison: compareWithIndependent(reading, solution, section.hasPermeability),
    headLost: solution.greatestHead - solution.leastHead,
    hasPermeability: section.hasPermeability,
    usesPhreaticLine: section.usesPhreaticLine,
    exits: steepestExits(solution, toSheet),
    net: placedNet(solution, dropsOf(reading), toSheet),
    picture: differencePicture(document, map, solution),
    imbalance,
    gap,
    surfaceMisfit,
    nodeCount,
  };
}

const USUAL_DROPS = 10;

/** The computed net has as many drops as the traced one, so that the two can be laid over one another. */
function dropsOf({ quantities }: NetReading): number {
  const counted = quantities.drops ?? quantities.tracedDrops ?? 0;
  return counted >= 2 ? counted : USUAL_DROPS;
}

/** Part of the extent of a boundary that is left out. */
const LEFT_OUT = 0.1;

function steepestExits(solution: SectionSolution, toSheet: (place: Pair) => SheetPx): SteepestExit[] {
  return [...new Set(solution.exits.map(({ id }) => id))].flatMap((id) => {
    const own = solution.exits.filter((exit) => exit.id === id);
    const singular = own.filter((exit) => exit.singular).map(({ at }) => at);
    const ends = endsOf(own.map(({ at }) => at));
    const least = LEFT_OUT * distance(...ends);
    let worst: { at: Pair; gradient: number } | null = null;
    for (const { at, gradient } of own) {
      if (gradient === null || [...ends, ...singular].some((corner) => distance(corner, at) < least))
        continue;
      if (worst === null || gradient > worst.gradient) worst = { at, gradient };
    }
    if (worst === null) return [];
    const [x, y] = toSheet(worst.at);
    return [{ id, at: [x, y], gradient: worst.gradient, hasSingular: singular.length > 0 }];
  });
}

/** The two places of a boundary that lie farthest apart, found by two sweeps; it has one place at least. */
function endsOf(places: readonly Pair[]): [Pair, Pair] {
  const farthest = (from: Pair) =>
    places.reduce((far, place) => (distance(from, place) > distance(from, far) ? place : far));
  const one = farthest(places[0]!);
  return [one, farthest(one)];
}

function distance([x, y]: Pair, [ox, oy]: Pair): number {
  return Math.hypot(x - ox, y - oy);
}
