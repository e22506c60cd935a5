import { makeFinding } from '#shared/compute/findings.ts';
import { type KnownPlace, knownFigures, rangeOfKnown } from '#shared/compute/known-places.ts';
import { type FitGrounds, fittedBy, type SetOutFit } from '#shared/compute/set-out-fit.ts';
import { fitByScales } from '#shared/compute/set-out-scales.ts';
import { fitByShape, lostShapeOf } from '#shared/compute/set-out-shape.ts';
import { unknownsOf } from '#shared/compute/set-out-unknowns.ts';
import {
  askOffsets,
  askUp,
  contradiction,
  departureFromUp,
  turnUnknown,
  UPRIGHT_LIMIT,
  upTurn,
} from '#shared/compute/set-out-up.ts';
import {
  fitSimilarity,
  type Similarity,
  similarityForward,
  similarityRotation,
  similarityScale,
} from '#shared/compute/similarity.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';

type KnownPoint = { id: string; value: EntityOf<'knownPoint'> };

/** Points nearer to each other than this, in pixels, are one point clicked twice. */
const COINCIDENT_PX = 2;

/**
 * Similarity through the known points of use `fit`, least squares. Clicks are base-raster pixels, typed values the
 * document's length unit; a point of which only the offset or only the elevation is typed is one equation. Where the
 * points tell no turn, the sheet's own horizontal is taken when it is said to be level. Two points, or points on one
 * line, leave the handedness open: then the fit whose up lies near the displayed up is taken, and when that does not
 * settle it the engineer is asked. Three points off one line settle it by their residuals. A drawing that is declared to
 * have two scales is fitted with two.
 */
export function fitByPoints(points: readonly KnownPoint[], setOut: EntityOf<'setOut'>): SetOutFit {
  const fit = fitByUsed(points, setOut);
  const checking = points.filter(({ value }) => value.use === 'check' && isKnown(value)).length;
  return fit.state === 'incomplete' && checking > 0
    ? { ...fit, finding: alsoOf(fit.finding, checking) }
    : fit;
}

/** Points enough may be there, but only to check. */
function alsoOf(finding: Finding, checking: number): Finding {
  const more = checking === 1 ? 'A known point only checks' : `${checking} known points only check`;
  return {
    ...finding,
    text: `${finding.text} ${more} the fit: say at “Use” if ${checking === 1 ? 'it' : 'they'} should set the scale.`,
  };
}

function fitByUsed(points: readonly KnownPoint[], setOut: EntityOf<'setOut'>): SetOutFit {
  const used = points.filter(isUsed);
  const places = used.map(placeOf);
  const needed = unknownsOf('equal', setOut.level === 'sheet');
  const marked = points.filter(({ value }) => value.use === 'fit').length;
  if (places.length < 2 || knownFigures(places) < needed)
    return incomplete(marked, knownFigures(places), needed);
  const lacking = lackingKind(places);
  if (lacking !== null) return lacking;
  if (
    spread(places.map((place) => place.sheet)) < COINCIDENT_PX ||
    Math.hypot(rangeOfKnown(places, 0), rangeOfKnown(places, 1)) <= 0
  ) {
    return coincident(used);
  }
  const shape = lostShapeOf(setOut);
  if (shape !== null) return fitByShape(places, shape, setOut);
  return setOut.scales === 'equal' ? fitByOneScale(used, places, setOut) : fitByScales(places, setOut);
}

function fitByOneScale(
  used: readonly KnownPoint[],
  places: readonly KnownPlace[],
  setOut: EntityOf<'setOut'>,
): SetOutFit {
  const turnFromSheet = fitSimilarity(places, false) === null;
  if (turnFromSheet && setOut.level !== 'sheet') return turnUnknown('the turn');
  const turn = turnFromSheet ? upTurn(setOut) : null;
  const fits = [false, true]
    .map((mirrored) => fitSimilarity(places, mirrored, turn))
    .filter((fit): fit is Similarity => fit !== null && usable(fit));
  const grounds: FitGrounds = {
    redundant: knownFigures(places) - unknownsOf('equal', turnFromSheet),
    turnFromSheet,
  };
  const [first, second] = fits;
  if (first === undefined) return turnFromSheet ? contradiction() : coincident(used);
  if (second === undefined) return heldAgainstAnswers(first, setOut, grounds);
  const settled = settledByResiduals(places, first, second);
  if (settled !== null) return heldAgainstAnswers(settled, setOut, grounds);
  return settleByUp(first, second, setOut, grounds);
}

/** The places through which a section is set out by points. */
export function controlPlaces(points: readonly KnownPoint[]): KnownPlace[] {
  return points.filter(isUsed).map(placeOf);
}

function isUsed({ value }: KnownPoint): boolean {
  return value.use === 'fit' && isKnown(value);
}

function isKnown({ offset, elevation }: EntityOf<'knownPoint'>): boolean {
  return offset !== null || elevation !== null;
}

/** A known point as equations of a fit. */
export function placeOf({ value }: KnownPoint): KnownPlace {
  return { sheet: value.at, section: [value.offset, value.elevation] };
}

function usable(fit: Similarity): boolean {
  const scale = similarityScale(fit);
  return Number.isFinite(scale) && scale > 0;
}

function incomplete(marked: number, typed: number, needed: number): SetOutFit {
  return missing(
    marked < 2
      ? `Mark ${marked === 0 ? 'two known points' : 'a second known point'} on the drawing.`
      : `Type offset and elevation of the known points: ${typed} of the ${needed} figures that are needed ${typed === 1 ? 'is' : 'are'} there.`,
  );
}

/** Stations alone give no elevation, and elevations alone no offset. */
function lackingKind(places: readonly KnownPlace[]): SetOutFit | null {
  for (const [axis, name] of [
    [0, 'offset'],
    [1, 'elevation'],
  ] as const) {
    if (places.every(({ section }) => section[axis] === null))
      return missing(`Type the ${name} of at least one known point.`);
  }
  return null;
}

function missing(text: string): SetOutFit {
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

function sumOfSquares(fit: Similarity, places: readonly KnownPlace[]): number {
  return places.reduce((sum, { sheet, section }) => {
    const [offset, elevation] = similarityForward(fit, ...sheet);
    return sum + (offset - (section[0] ?? offset)) ** 2 + (elevation - (section[1] ?? elevation)) ** 2;
  }, 0);
}

/** The clearly better of the two fits when the points do not lie on one line; null when they cannot tell. */
function settledByResiduals(
  places: readonly KnownPlace[],
  direct: Similarity,
  mirrored: Similarity,
): Similarity | null {
  if (knownFigures(places) <= unknownsOf('equal')) return null;
  const directSquares = sumOfSquares(direct, places);
  const mirroredSquares = sumOfSquares(mirrored, places);
  const extent = Math.hypot(rangeOfKnown(places, 0), rangeOfKnown(places, 1));
  const worse = Math.max(directSquares, mirroredSquares);
  // Points almost on one line fit both ways alike: the worse fit must miss by a visible part of the section.
  if (Math.sqrt(worse / places.length) < 0.01 * extent) return null;
  if (Math.min(directSquares, mirroredSquares) > worse / 9) return null;
  return directSquares < mirroredSquares ? direct : mirrored;
}

/** What the points settle by themselves must still agree with the way that is up and the side said: a slip shows there. */
function heldAgainstAnswers(settled: Similarity, setOut: EntityOf<'setOut'>, grounds: FitGrounds): SetOutFit {
  if (departureFromUp(similarityRotation(settled), setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  if (setOut.offsetsGrow !== null && (setOut.offsetsGrow === 'left') !== settled.mirrored)
    return contradiction();
  return fittedBy(settled, grounds);
}

function settleByUp(
  direct: Similarity,
  mirrored: Similarity,
  setOut: EntityOf<'setOut'>,
  grounds: FitGrounds,
): SetOutFit {
  if (setOut.offsetsGrow !== null) {
    const chosen = setOut.offsetsGrow === 'left' ? mirrored : direct;
    if (departureFromUp(similarityRotation(chosen), setOut) <= UPRIGHT_LIMIT)
      return fittedBy(chosen, grounds);
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  }
  const departure = (fit: Similarity) => departureFromUp(similarityRotation(fit), setOut);
  const [first, second] = departure(direct) <= departure(mirrored) ? [direct, mirrored] : [mirrored, direct];
  if (departure(first) > UPRIGHT_LIMIT) return setOut.upQuarterTurns === null ? askUp() : askOffsets();
  // Both within a right angle of upright: a line through the points steeper than 45 degrees cannot tell.
  if (departure(second) < Math.PI / 2) return askOffsets();
  return fittedBy(first, grounds);
}
