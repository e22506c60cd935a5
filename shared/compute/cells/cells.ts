import {
  angleBetween,
  type CellMeasures,
  type CellSides,
  lengthOfPoints,
  measureCell,
} from '#shared/compute/cells/quadrilateral.ts';
import {
  type Rail,
  railsOf,
  type StripEnd,
  type StripEnds,
  type StripRails,
} from '#shared/compute/cells/rails.ts';
import { CORNER_DEG, chordFor, singularPoints } from '#shared/compute/cells/singular-points.ts';
import { distanceToRing, ringContains, ringOf } from '#shared/compute/geometry/polygon.ts';
import { boxesMeet, firstOf, type Polyline, pieceOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import type { Equipotential, NetModel } from '#shared/compute/net/net-model.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/**
 * Why a cell is not judged: the ground has a corner on it; a flow line ends within it; it lies at a face of free
 * outflow, which is neither flow line nor equipotential.
 */
export type NotJudged = 'singular' | 'lineEnds' | 'freeFace';

/** A cell of the net: between two neighbouring head lines and two neighbouring rails. Working pixels. */
export type NetCell = {
  /** Head lines towards the headwater and towards the outlet. */
  readonly before: string;
  readonly after: string;
  /** Rails at its left and right, seen along the flow. */
  readonly left: Rail;
  readonly right: Rail;
  readonly sides: CellSides;
  readonly measures: CellMeasures;
  /** B/L. */
  readonly ratio: number;
  /** True where its line after is a potential boundary at which water leaves. */
  readonly isExit: boolean;
  readonly notJudged: NotJudged | null;
};

/** The cells of a net, with the rails of each strip from which they were made; `rails` in the order of the strips. */
export type NetCells = {
  readonly cells: readonly NetCell[];
  readonly rails: readonly StripRails[];
  readonly singular: readonly Pair[];
};

/** A flow line this many tracing accuracies, and no less than these pixels, from a boundary is the boundary itself. */
const ALONG_ACCURACIES = 2;
const LEAST_ALONG_PX = 2;

/** A corner of the ground belongs to a cell when it lies within this part of its length of its outline. */
const CORNER_PART = 0.1;

/**
 * The cells of a net in order: strip by strip along the flow, from left to right in each. Strips in which fewer than
 * two rails are traced have none. `accuracyPx`: tracing accuracy. Everything in working pixels, in which an isotropic
 * net has square cells. Never throws; lines that cross within a strip make no cell there.
 */
export function cellsOf(model: NetModel, accuracyPx: number): NetCells {
  const flowLines = linesOfKind(model.lines, 'flowLine');
  const singular = singularPoints(model, accuracyPx);
  const slack = Math.max(LEAST_ALONG_PX, ALONG_ACCURACIES * accuracyPx);
  const outlets = new Set(model.potentials.filter(({ role }) => role === 'outlet').map(({ id }) => id));
  const boundaries = new Set(model.potentials.map(({ id }) => id));
  const ends = endFinder(model);
  const rails = model.strips.map((strip) => railsOf(strip, flowLines, ends(strip), slack, model.reach));
  const cells = model.strips.flatMap((strip, i) =>
    cellsOfStrip(strip, rails[i]!, {
      singular,
      accuracyPx,
      isExit: outlets.has(strip.after),
      bounds: { before: boundaries.has(strip.before), after: boundaries.has(strip.after) },
    }),
  );
  return { cells, rails, singular };
}

/** Which traced line closes each end of a strip: the one on which the equipotentials beside it have their feet. */
function endFinder(model: NetModel): (strip: Strip) => StripEnds {
  const lines = new Map(model.equipotentials.map((line) => [line.id, line]));
  const kinds = new Map<string, StripEnd['kind']>();
  for (const { id, kind } of model.lines)
    if (kind === 'flowLine' || kind === 'impervious' || kind === 'phreaticLine') kinds.set(id, kind);
  for (const { id, level } of model.potentials) if (level === null) kinds.set(id, 'freeFace');
  const footOf = (line: Equipotential | undefined, shape: Polyline, which: 0 | 1) => {
    if (line === undefined) return [];
    const { start, end } = line.footed;
    const isReversed = !samePlace(firstOf(shape), firstOf(line.footed.shape));
    const foot = (which === 0) !== isReversed ? start : end;
    const kind = foot === null ? undefined : kinds.get(foot.carrier.id);
    return kind === undefined ? [] : [{ id: foot!.carrier.id, kind }];
  };
  return (strip) => {
    const endAt = (which: 0 | 1) => {
      // Beside a boundary that the flow passes water comes and goes, as along a free face.
      const passed = strip.held.find(({ way }) => way === which);
      if (passed) return { id: passed.id, kind: 'freeFace' as const };
      const found = [
        ...footOf(lines.get(strip.before), strip.beforeShape, which),
        ...footOf(lines.get(strip.after), strip.afterShape, which),
      ];
      return found.find(({ kind }) => kind === 'freeFace') ?? found[0] ?? null;
    };
    return [endAt(0), endAt(1)];
  };
}

type StripFacts = {
  readonly singular: readonly Pair[];
  readonly accuracyPx: number;
  readonly isExit: boolean;
  /** Which of the two head lines are potential boundaries, given by the ground. */
  readonly bounds: { readonly before: boolean; readonly after: boolean };
};

function cellsOfStrip(strip: Strip, rails: StripRails, facts: StripFacts): NetCell[] {
  return rails.rails.slice(1).flatMap((right, i) => {
    const left = rails.rails[i]!;
    const sides = sidesBetween(strip, left, right, rails.leftFirst);
    if (sides === null) return [];
    const measures = measureCell(sides);
    if (!(measures.length > 0) || !(measures.width > 0)) return [];
    const { before, after } = strip;
    return [
      {
        before,
        after,
        left,
        right,
        sides,
        measures,
        ratio: measures.width / measures.length,
        isExit: facts.isExit,
        notJudged: reasonAgainst(sides, measures, left, right, rails, facts),
      },
    ];
  });
}

/** The sides between two neighbouring rails; null when the rails change their order within the strip. */
function sidesBetween(strip: Strip, left: Rail, right: Rail, leftFirst: boolean): CellSides | null {
  const turn = leftFirst ? 1 : -1;
  if (!(turn * (right.sBefore - left.sBefore) > 0) || !(turn * (right.sAfter - left.sAfter) > 0)) return null;
  return {
    before: pieceOf(strip.beforeShape, left.sBefore, right.sBefore),
    after: pieceOf(strip.afterShape, left.sAfter, right.sAfter),
    left: left.points,
    right: right.points,
  };
}

function reasonAgainst(
  sides: CellSides,
  measures: CellMeasures,
  left: Rail,
  right: Rail,
  rails: StripRails,
  facts: StripFacts,
): NotJudged | null {
  if (left.kind === 'freeFace' || right.kind === 'freeFace') return 'freeFace';
  const holds = (places: readonly number[], a: number, b: number) =>
    places.some((s) => s > Math.min(a, b) && s < Math.max(a, b));
  if (holds(rails.brokenBefore, left.sBefore, right.sBefore)) return 'lineEnds';
  if (holds(rails.brokenAfter, left.sAfter, right.sAfter)) return 'lineEnds';
  const near = Math.max(3 * facts.accuracyPx, CORNER_PART * Math.min(measures.length, measures.width));
  if (holdsSingular(sides, facts.singular, near)) return 'singular';
  return hasGroundCorner(sides, left, right, facts) ? 'singular' : null;
}

/**
 * True when a singular point lies on the outline of a cell, to within `near`, or in it: the tip of a wall traced as one
 * line lies within the cell that goes round it, since its two faces are one place.
 */
function holdsSingular(sides: CellSides, singular: readonly Pair[], near: number): boolean {
  if (singular.length === 0) return false;
  const { before, after, left, right } = sides;
  const ring = ringOf([...before, ...right, ...[...after].reverse(), ...[...left].reverse()]);
  if (ring === null) return false;
  return singular.some(
    ([x, y]) =>
      boxesMeet(ring.box, { minX: x, maxX: x, minY: y, maxY: y }, near) &&
      (ringContains(ring, x, y) || distanceToRing(ring, x, y) <= near),
  );
}

/** True where a potential boundary and a traced boundary along the flow meet at an angle far from a right one. */
function hasGroundCorner(sides: CellSides, left: Rail, right: Rail, facts: StripFacts): boolean {
  const chord = chordFor(facts.accuracyPx);
  return [left, right].some((rail) => {
    if (rail.kind === 'flowLine') return false;
    const isLeft = rail === left;
    const angleAt = (across: readonly Pair[], along: readonly Pair[]) =>
      Math.abs(angleBetween(leaving(across, chord), leaving(along, chord)) - 90);
    const from = (side: readonly Pair[]) => (isLeft ? side : [...side].reverse());
    return (
      (facts.bounds.before && angleAt(from(sides.before), rail.points) > CORNER_DEG) ||
      (facts.bounds.after && angleAt(from(sides.after), [...rail.points].reverse()) > CORNER_DEG)
    );
  });
}

/** Direction in which a side leaves its first point, over a chord. */
function leaving(side: readonly Pair[], chord: number): Pair {
  const [x, y] = side[0]!;
  let end = side[side.length - 1]!;
  for (let i = 1; i < side.length; i += 1) {
    if (lengthOfPoints(side.slice(0, i + 1)) < chord) continue;
    end = side[i]!;
    break;
  }
  return [end[0] - x, end[1] - y];
}

function samePlace(a: Pair, b: Pair): boolean {
  return a[0] === b[0] && a[1] === b[1];
}
