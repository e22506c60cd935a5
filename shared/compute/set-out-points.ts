import { makeFinding } from '#shared/compute/findings.ts';
import { fittedBy, type SetOutFit } from '#shared/compute/set-out-fit.ts';
import { fitByScales } from '#shared/compute/set-out-scales.ts';
import {
  askOffsets,
  askUp,
  contradiction,
  departureFromUp,
  UPRIGHT_LIMIT,
} from '#shared/compute/set-out-up.ts';
import {
  type ControlPair,
  fitSimilarity,
  type Similarity,
  similarityResidual,
  similarityRotation,
  similarityScale,
} from '#shared/compute/similarity.ts';
import type { EntityOf } from '#shared/contract/document.ts';

type KnownPoint = { id: string; value: EntityOf<'knownPoint'> };

/** Points nearer to each other than this, in pixels, are one point clicked twice. */
const COINCIDENT_PX = 2;

/**
 * Similarity through the known points of use `fit`, least squares. Clicks are base-raster pixels, typed values the
 * document's length unit. Two points, or points on one line, leave the handedness open: then the fit whose up lies
 * near the displayed up is taken, and when that does not settle it the engineer is asked. Three points off one line
 * settle it by their residuals. A drawing that is declared to have two scales is fitted with two.
 */
export function fitByPoints(points: readonly KnownPoint[], setOut: EntityOf<'setOut'>): SetOutFit {
  const used = points.filter(isComplete);
  const pairs = used.map(pairOf);
  if (pairs.length < 2)
    return incomplete(points.filter(({ value }) => value.use === 'fit').length, used.length);
  if (
    spread(pairs.map((pair) => pair.sheet)) < COINCIDENT_PX ||
    spread(pairs.map((pair) => pair.section)) <= 0
  ) {
    return coincident(used);
  }
  if (setOut.scales !== 'equal') return fitByScales(pairs, setOut);
  const direct = fitSimilarity(pairs, false);
  const mirrored = fitSimilarity(pairs, true);
  if (direct === null || mirrored === null || !usable(direct) || !usable(mirrored)) return coincident(used);
  const settled = settledByResiduals(pairs, direct, mirrored);
  if (settled !== null) return heldAgainstAnswers(settled, setOut, pairs.length);
  return settleByUp(direct, mirrored, setOut, pairs.length);
}

/** The pairs through which a section is set out by points. */
export function controlPairs(points: readonly KnownPoint[]): ControlPair[] {
  return points.filter(isComplete).map(pairOf);
}

function isComplete({ value }: KnownPoint): boolean {
  return value.use === 'fit' && value.offset !== null && value.elevation !== null;
}

function pairOf({ value }: KnownPoint): ControlPair {
  return { sheet: value.at, section: [value.offset ?? 0, value.elevation ?? 0] };
}

function usable(fit: Similarity): boolean {
  const scale = similarityScale(fit);
  return Number.isFinite(scale) && scale > 0;
}

function incomplete(marked: number, typed: number): SetOutFit {
  const text =
    marked < 2
      ? `Mark ${marked === 0 ? 'two known points' : 'a second known point'} on the drawing.`
      : `Type offset and elevation of the known points: ${typed} of the two that are needed ${typed === 1 ? 'is' : 'are'} complete.`;
  return {
    state: 'incomplete',
    finding: makeFinding('missing', 'setOutIncomplete', text, { cell: 'scale' }),
  };
}

function coincident(points: readonly KnownPoint[]): SetOutFit {
  return {
    state: 'refused',
    finding: makeFinding(
      'wrong',
      'knownPointsCoincide',
      'The known points lie on one another, on the sheet or in their typed values. Mark points that are far apart.',
      { cell: 'scale', entityIds: points.map(({ id }) => id), at: points[0]?.value.at ?? null },
    ),
  };
}

/** Greatest extent of a set of places along either axis, in their own unit. */
function spread(places: ReadonlyArray<readonly [number, number]>): number {
  const xs = places.map((place) => place[0]);
  const ys = places.map((place) => place[1]);
  return Math.hypot(Math.max(...xs) - Math.min(...xs), Math.max(...ys) - Math.min(...ys));
}

function sumOfSquares(fit: Similarity, pairs: readonly ControlPair[]): number {
  return pairs.reduce((sum, pair) => {
    const [offset, elevation] = similarityResidual(fit, pair);
    return sum + offset * offset + elevation * elevation;
  }, 0);
}

/** The clearly better of the two fits when the points do not lie on one line; null when they cannot tell. */
function settledByResiduals(
  pairs: readonly ControlPair[],
  direct: Similarity,
  mirrored: Similarity,
): Similarity | null {
  if (pairs.length < 3) return null;
  const directSquares = sumOfSquares(direct, pairs);
  const mirroredSquares = sumOfSquares(mirrored, pairs);
  const extent = spread(pairs.map((pair) => pair.section));
  const worse = Math.max(directSquares, mirroredSquares);
  // Points almost on one line fit both ways alike: the worse fit must miss by a visible part of the section.
  if (Math.sqrt(worse / pairs.length) < 0.01 * extent) return null;
  if (Math.min(directSquares, mirroredSquares) > worse / 9) return null;
  return directSquares < mirroredSquares ? direct : mirrored;
}

/** What the points settle by themselves must still agree with the way that is up and the side said: a slip shows there. */
function heldAgainstAnswers(settled: Similarity, setOut: EntityOf<'setOut'>, fitPoints: number): SetOutFit {
  if (departureFromUp(similarityRotation(settled), setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  if (setOut.offsetsGrow !== null && (setOut.offsetsGrow === 'left') !== settled.mirrored)
    return contradiction();
  return fittedBy(settled, fitPoints);
}

function settleByUp(
  direct: Similarity,
  mirrored: Similarity,
  setOut: EntityOf<'setOut'>,
  fitPoints: number,
): SetOutFit {
  if (setOut.offsetsGrow !== null) {
    const chosen = setOut.offsetsGrow === 'left' ? mirrored : direct;
    if (departureFromUp(similarityRotation(chosen), setOut) <= UPRIGHT_LIMIT)
      return fittedBy(chosen, fitPoints);
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  }
  const departure = (fit: Similarity) => departureFromUp(similarityRotation(fit), setOut);
  const [first, second] = departure(direct) <= departure(mirrored) ? [direct, mirrored] : [mirrored, direct];
  if (departure(first) > UPRIGHT_LIMIT) return setOut.upQuarterTurns === null ? askUp() : askOffsets();
  // Both within a right angle of upright: a line through the points steeper than 45 degrees cannot tell.
  if (departure(second) < Math.PI / 2) return askOffsets();
  return fittedBy(first, fitPoints);
}
