import type { NetCell, NetCells } from '#shared/compute/cells/cells.ts';
import { channelsOf } from '#shared/compute/cells/channels.ts';
import {
  type CellFacts,
  cellFlow,
  commonRatioOf,
  middleValue,
  seriesK,
} from '#shared/compute/cells/common-ratio.ts';
import { cellsByStrip } from '#shared/compute/cells/grouped.ts';
import { measureCell } from '#shared/compute/cells/quadrilateral.ts';
import type { StripRails } from '#shared/compute/cells/rails.ts';
import { lengthOf, pieceOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** Where the spacing of the lines says that one is missing. Place in working pixels. */
export type MissingLine = {
  readonly kind: 'equipotential' | 'flowLine';
  /** The two head lines, or the two flow lines (where traced), between which it is missing. */
  readonly between: readonly string[];
  /** How many times as long, or as wide, as the others the cells are: about 2 for one line missing. */
  readonly factor: number;
  readonly at: Pair;
};

/**
 * Cells this many times as long or as wide as the others make a line missing: nearer to 2 than to 1 in proportion, with
 * room for cells drawn by eye, which in sketched nets differ by a quarter.
 */
const MISSING_FACTOR = 1.6;

/** Columns into which a strip without flow lines is parted. */
const COLUMNS = 8;

/**
 * Tells where a line seems to be missing: an equipotential in a strip whose cells are about twice as long for their
 * width as those of the net, a flow line in a channel whose cells are about twice as wide. Without flow lines whole
 * strips are compared, since all of them carry the same flow. `entered`: B/L as entered, 1 for squares. `facts` must
 * give the drops typed between two lines, so that an interval of two drops is not taken for a missing line. Never
 * throws; nothing is told of a net with fewer than three strips.
 */
export function spacingOf(model: NetModel, net: NetCells, entered: number, facts: CellFacts): MissingLine[] {
  if (model.strips.length < 3) return [];
  return net.cells.length > 0 ? amongCells(net.cells, entered, facts) : amongStrips(model, net.rails, facts);
}

function amongCells(cells: readonly NetCell[], entered: number, facts: CellFacts): MissingLine[] {
  const { judgedBy } = commonRatioOf(cells, entered, facts);
  const middleOf = (members: readonly NetCell[]) =>
    middleValue(
      members.map((cell) => cellFlow(cell, facts)).filter((flow) => flow !== null),
      judgedBy,
    );
  const long = cellsByStrip(cells).flatMap((members): MissingLine[] => {
    const middle = middleOf(members) ?? middleThroughSoils(members, judgedBy, facts);
    if (middle === null || judgedBy / middle < MISSING_FACTOR) return [];
    const { before, after } = members[0]!;
    return [
      { kind: 'equipotential', between: [before, after], factor: judgedBy / middle, at: placeIn(members) },
    ];
  });
  const wide = channelsOf(cells, facts).flatMap(({ cells: members, left, right }): MissingLine[] => {
    const middle = middleOf(members);
    if (middle === null || middle / judgedBy < MISSING_FACTOR) return [];
    const between = [left, right].filter((id) => id !== null);
    return [{ kind: 'flowLine', between, factor: middle / judgedBy, at: placeIn(members) }];
  });
  return [...long, ...wide];
}

/** Where every cell of a strip lies in more than one soil: their middle flow with the soils one after another. */
function middleThroughSoils(members: readonly NetCell[], judgedBy: number, facts: CellFacts): number | null {
  const flows = members
    .filter(({ notJudged }) => notJudged === null)
    .map((cell) => {
      const k = seriesK(cell.measures.along, facts);
      return k === null ? 0 : k * facts.dropsBetween(cell.before, cell.after) * cell.ratio;
    });
  return middleValue(
    flows.filter((flow) => Number.isFinite(flow) && flow > 0),
    judgedBy,
  );
}

function placeIn(cells: readonly NetCell[]): Pair {
  return cells[cells.length >> 1]!.measures.middle;
}

function amongStrips(model: NetModel, rails: readonly StripRails[], facts: CellFacts): MissingLine[] {
  const strips = model.strips.flatMap((strip, i) => {
    // A strip of which an end is open goes on beyond it, by nobody knows how much.
    if (rails[i]!.rails.filter((rail) => rail.edge !== null && rail.kind !== 'freeFace').length < 2)
      return [];
    const flow = flowThrough(strip, facts);
    return flow === null ? [] : [{ strip, flow }];
  });
  const common = middleValue(
    strips.map(({ flow }) => flow),
    1,
  );
  if (common === null || strips.length < 3) return [];
  return strips.flatMap(({ strip, flow }): MissingLine[] => {
    if (common / flow < MISSING_FACTOR) return [];
    const { before, after } = strip;
    return [
      { kind: 'equipotential', between: [before, after], factor: common / flow, at: middleOfStrip(strip) },
    ];
  });
}

/** Flow through a whole strip for each drop and unit permeability: the sum of k·B/L over columns side by side. */
function flowThrough(strip: Strip, facts: CellFacts): number | null {
  const drops = facts.dropsBetween(strip.before, strip.after);
  const lengths = [lengthOf(strip.beforeShape), lengthOf(strip.afterShape)] as const;
  let sum = 0;
  for (let i = 0; i < COLUMNS; i += 1) {
    const [from, to] = [i / COLUMNS, (i + 1) / COLUMNS];
    const before = pieceOf(strip.beforeShape, from * lengths[0], to * lengths[0]);
    const after = pieceOf(strip.afterShape, from * lengths[1], to * lengths[1]);
    const { length, width, along } = measureCell({
      before,
      after,
      left: [before[0]!, after[0]!],
      right: [before[before.length - 1]!, after[after.length - 1]!],
    });
    const k = seriesK(along, facts);
    if (k === null || !(length > 0)) return null;
    sum += (k * drops * width) / length;
  }
  return Number.isFinite(sum) && sum > 0 ? sum : null;
}

function middleOfStrip(strip: Strip): Pair {
  const before = pieceOf(strip.beforeShape, 0, lengthOf(strip.beforeShape) / 2).at(-1)!;
  const after = pieceOf(strip.afterShape, 0, lengthOf(strip.afterShape) / 2).at(-1)!;
  return [(before[0] + after[0]) / 2, (before[1] + after[1]) / 2];
}
