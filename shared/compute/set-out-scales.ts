import { makeFinding } from '#shared/compute/findings.ts';
import { fittedByScales, type SetOutFit } from '#shared/compute/set-out-fit.ts';
import { askUp, contradiction, departureFromUp, UPRIGHT_LIMIT, upTurn } from '#shared/compute/set-out-up.ts';
import type { ControlPair } from '#shared/compute/similarity.ts';
import { fitTwoScales, type TwoScales } from '#shared/compute/two-scales.ts';
import type { EntityOf } from '#shared/contract/document.ts';

/** Known points must lie this far apart, in pixels, in each direction that they give a scale to. */
const LEAST_RANGE_PX = 10;

/**
 * Two scales, along the level and upwards, through known points that are far apart; least squares in pixels. Three
 * points off one line tell the turn of the sheet and the side to which offsets grow; two, or points on one line, tell
 * the scales only when the sheet's own horizontal is said to be level. Clicks are base-raster pixels, typed values the
 * document's length unit.
 */
export function fitByScales(pairs: readonly ControlPair[], setOut: EntityOf<'setOut'>): SetOutFit {
  if (rangeOf(pairs, 0) === 0 || rangeOf(pairs, 1) === 0) return oneDirectionOnly();
  const byPoints = pairs.length >= 3 ? fitTwoScales(pairs, null) : null;
  if (byPoints === null && setOut.level !== 'sheet') return turnUnknown();
  const fit = byPoints ?? fitTwoScales(pairs, upTurn(setOut));
  if (fit === null || !isUsable(fit, pairs)) return tooNear();
  if (departureFromUp(fit.rotation, setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  if (setOut.offsetsGrow !== null && (setOut.offsetsGrow === 'left') !== fit.mirrored) return contradiction();
  return fittedByScales(fit, pairs.length);
}

function rangeOf(pairs: readonly ControlPair[], axis: 0 | 1): number {
  const values = pairs.map(({ section }) => section[axis]);
  return Math.max(...values) - Math.min(...values);
}

function isUsable({ along, up }: TwoScales, pairs: readonly ControlPair[]): boolean {
  return rangeOf(pairs, 0) / along >= LEAST_RANGE_PX && rangeOf(pairs, 1) / up >= LEAST_RANGE_PX;
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

function turnUnknown(): SetOutFit {
  return {
    state: 'ambiguous',
    finding: makeFinding(
      'missing',
      'turnUnknown',
      'Known points on one line do not tell two scales and the turn of the sheet. Mark a third point off their line, or say that the sheet’s own horizontal is level.',
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
