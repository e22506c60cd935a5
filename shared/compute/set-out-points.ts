import { makeFinding } from '#shared/compute/findings.ts';
import type { SetOutFit } from '#shared/compute/set-out.ts';
import { askOffsets, askUp, departureFromUp, UPRIGHT_LIMIT } from '#shared/compute/set-out-up.ts';
import {
  type ControlPair,
  fitSimilarity,
  type Similarity,
  similarityResidual,
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
 * settle it by their residuals.
 */
export function fitByPoints(points: readonly KnownPoint[], setOut: EntityOf<'setOut'>): SetOutFit {
  const used = points.filter(
    ({ value }) => value.use === 'fit' && value.offset !== null && value.elevation !== null,
  );
  const pairs = used.map(
    ({ value }): ControlPair => ({
      sheet: value.at,
      section: [value.offset ?? 0, value.elevation ?? 0],
    }),
  );
  if (pairs.length < 2)
    return incomplete(points.filter(({ value }) => value.use === 'fit').length, used.length);
  if (
    spread(pairs.map((pair) => pair.sheet)) < COINCIDENT_PX ||
    spread(pairs.map((pair) => pair.section)) <= 0
  ) {
    return coincident(used);
  }
  const direct = fitSimilarity(pairs, false);
  const mirrored = fitSimilarity(pairs, true);
  if (direct === null || mirrored === null || !usable(direct) || !usable(mirrored)) return coincident(used);
  const settled = settledByResiduals(pairs, direct, mirrored);
  if (settled !== null) return heldAgainstAnswers(settled, setOut, pairs.length);
  return settleByUp(direct, mirrored, setOut, pairs.length);
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
  if (departureFromUp(settled, setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  if (setOut.offsetsGrow !== null && (setOut.offsetsGrow === 'left') !== settled.mirrored)
    return contradiction();
  return { state: 'fitted', similarity: settled, fitPoints };
}

function settleByUp(
  direct: Similarity,
  mirrored: Similarity,
  setOut: EntityOf<'setOut'>,
  fitPoints: number,
): SetOutFit {
  if (setOut.offsetsGrow !== null) {
    const chosen = setOut.offsetsGrow === 'left' ? mirrored : direct;
    if (departureFromUp(chosen, setOut) <= UPRIGHT_LIMIT)
      return { state: 'fitted', similarity: chosen, fitPoints };
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  }
  const [first, second] =
    departureFromUp(direct, setOut) <= departureFromUp(mirrored, setOut)
      ? [direct, mirrored]
      : [mirrored, direct];
  if (departureFromUp(first, setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : askOffsets();
  // Both within a right angle of upright: a line through the points steeper than 45 degrees cannot tell.
  if (departureFromUp(second, setOut) < Math.PI / 2) return askOffsets();
  return { state: 'fitted', similarity: first, fitPoints };
}

function contradiction(): SetOutFit {
  return {
    state: 'refused',
    finding: makeFinding(
      'wrong',
      'setOutContradiction',
      'The known points contradict the side to which offsets are said to grow or the way that is said to be up. Check the typed values and both answers.',
      { cell: 'scale' },
    ),
  };
}
