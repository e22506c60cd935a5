import { makeFinding } from '#shared/compute/findings.ts';
import type { SetOutFit } from '#shared/compute/set-out-fit.ts';
import type { EntityOf } from '#shared/contract/document.ts';

/** A fit whose up departs from the displayed up by more than this, in radians, does not look upright. */
export const UPRIGHT_LIMIT = Math.PI / 3;

/**
 * Angle between the section's up and the way that is up on the sheet, radians from 0 to π. The way that is up is
 * the sheet's own up turned clockwise by the stated quarter turns; none stated counts as none. `rotation`: turn of the
 * section's level on the sheet, radians, clockwise positive.
 */
export function departureFromUp(rotation: number, setOut: EntityOf<'setOut'>): number {
  return Math.abs(wrapped(rotation - upTurn(setOut)));
}

/** Clockwise turn of the way that is up on the sheet, radians; none stated counts as none. */
export function upTurn(setOut: EntityOf<'setOut'>): number {
  return ((setOut.upQuarterTurns ?? 0) * Math.PI) / 2;
}

/** An angle in radians brought into (−π, π]. */
export function wrapped(angle: number): number {
  return Math.atan2(Math.sin(angle), Math.cos(angle));
}

/** The answer that asks which way is up on the sheet. */
export function askUp(): SetOutFit {
  return {
    state: 'ambiguous',
    finding: makeFinding(
      'missing',
      'upUnknown',
      'By the known points the sheet does not stand upright. Check their typed values, or say which way is up on it.',
      { cell: 'scale' },
    ),
  };
}

/** The answer that asks to which side offsets grow. */
export function askOffsets(): SetOutFit {
  return {
    state: 'ambiguous',
    finding: makeFinding(
      'missing',
      'offsetsSideUnknown',
      'The line through the known points is too steep to tell the side. Say whether offsets grow to the left or to the right.',
      { cell: 'scale' },
    ),
  };
}

/** The answer to known points that leave open how the sheet is turned; `what`: what they do not tell. */
export function turnUnknown(what: string): SetOutFit {
  return {
    state: 'ambiguous',
    finding: makeFinding(
      'missing',
      'turnUnknown',
      `Known points on one line, or offsets along one line and elevations along another, do not tell ${what} of the sheet. Mark a further point off the line, or one line of the drawing at both its ends, or say that the sheet’s own horizontal is level.`,
      { cell: 'scale' },
    ),
  };
}

/** The answer to known points that deny what is said of the side or of the way that is up. */
export function contradiction(): SetOutFit {
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
