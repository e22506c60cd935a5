import { makeFinding } from '#shared/compute/findings.ts';
import { type KnownPlace, knownFigures, rangeOfKnown } from '#shared/compute/known-places.ts';
import { fittedByScales, type SetOutFit } from '#shared/compute/set-out-fit.ts';
import { unknownsOf } from '#shared/compute/set-out-unknowns.ts';
import {
  askUp,
  contradiction,
  departureFromUp,
  turnUnknown,
  UPRIGHT_LIMIT,
  upTurn,
} from '#shared/compute/set-out-up.ts';
import { fitTwoScales, type TwoScales } from '#shared/compute/two-scales.ts';
import type { EntityOf } from '#shared/contract/document.ts';

/** Known points must lie this far apart, in pixels, in each direction that they give a scale to. */
const LEAST_RANGE_PX = 10;

/**
 * Two scales, along the level and upwards, through known places that are far apart; least squares in pixels. Where the
 * places tell the turn of the sheet it is fitted; two points, points on one line, or offsets along one line and
 * elevations along another tell the scales only when the sheet's own horizontal is said to be level. Clicks are
 * base-raster pixels, typed values the document's length unit.
 */
export function fitByScales(places: readonly KnownPlace[], setOut: EntityOf<'setOut'>): SetOutFit {
  if (rangeOfKnown(places, 0) === 0 || rangeOfKnown(places, 1) === 0) return oneDirectionOnly();
  const byPoints = knownFigures(places) >= unknownsOf(setOut.scales) ? fitTwoScales(places, null) : null;
  if (byPoints === null && setOut.level !== 'sheet') return turnUnknown('two scales and the turn');
  const fit = byPoints ?? fitTwoScales(places, upTurn(setOut));
  if (fit === null || !isUsable(fit, places)) return tooNear();
  if (departureFromUp(fit.rotation, setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  if (setOut.offsetsGrow !== null && (setOut.offsetsGrow === 'left') !== fit.mirrored) return contradiction();
  return fittedByScales(fit, {
    redundant: knownFigures(places) - unknownsOf(setOut.scales, byPoints === null),
    turnFromSheet: byPoints === null,
  });
}

function isUsable({ along, up }: TwoScales, places: readonly KnownPlace[]): boolean {
  return rangeOfKnown(places, 0) / along >= LEAST_RANGE_PX && rangeOfKnown(places, 1) / up >= LEAST_RANGE_PX;
}

/** The answer to a drawing of two scales that is to be set out by one distance. */
export function distanceGivesOneScale(): SetOutFit {
  return {
    state: 'incomplete',
    finding: makeFinding(
      'missing',
      'scalesNeedPoints',
      'One distance gives one scale, but the drawing is declared to have two. Set the section out by known points with offset and elevation.',
      { cell: 'scale' },
    ),
  };
}

function oneDirectionOnly(): SetOutFit {
  return {
    state: 'incomplete',
    finding: makeFinding(
      'missing',
      'setOutIncomplete',
      'For two scales the known points must differ in offset and in elevation. Mark a further point.',
      { cell: 'scale' },
    ),
  };
}

function tooNear(): SetOutFit {
  return {
    state: 'refused',
    finding: makeFinding(
      'wrong',
      'knownPointsCoincide',
      'The known points lie too near to one another along the level or upwards to give a scale in that direction. Mark points that are far apart in both.',
      { cell: 'scale' },
    ),
  };
}
