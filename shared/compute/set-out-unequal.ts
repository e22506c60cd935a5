import { makeFinding } from '#shared/compute/findings.ts';
import { type KnownPlace, knownFigures } from '#shared/compute/known-places.ts';
import { type FittedSection, squaresOfMiss } from '#shared/compute/set-out-fit.ts';
import { upTurn } from '#shared/compute/set-out-up.ts';
import { fitTwoScales, missInPixels, type TwoScales } from '#shared/compute/two-scales.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText, plainText } from '#shared/text/number-text.ts';

/** Scales that differ by more than this part are two scales; paper shrinks by less. */
const UNEQUAL_PART = 0.05;
/** Two scales must fit the points this many times better than one before they are believed. */
const BETTER = 3;
/** A stated scale is met within this part. */
const STATED_PART = 0.02;
/** Two scales, turn and shifts meet five figures exactly: only with more can they fit better than one scale. */
const TOLD_BY_FIT = 6;
/** A sheet that is turned by more than this is seldom a crooked scan. */
const TURN_DEG = 5;

/**
 * Questions known points that are set out by one scale and speak for two: three or more by the fit, two by the scale
 * stated on the drawing (`scalePerPx`: length units per pixel by it, null where none is stated or the resolution is
 * unknown), or else by a turn that no scan has.
 */
export function questionEqualScales(
  places: readonly KnownPlace[],
  fit: FittedSection,
  setOut: EntityOf<'setOut'>,
  scalePerPx: number | null,
): Finding[] {
  const enough = knownFigures(places) >= TOLD_BY_FIT;
  const better = enough ? betterByTwo(places, fit) : statedForOne(places, fit, setOut, scalePerPx);
  if (better !== null) return [mustBeDeclared(better)];
  return enough ? [] : questionTurn(fit);
}

function betterByTwo(places: readonly KnownPlace[], one: FittedSection): TwoScales | null {
  const two = fitTwoScales(places, null);
  if (two === null || !areUnequal(two)) return null;
  const missOfOne = Math.sqrt(squaresOfMiss(one, places) / places.length);
  return missOfOne >= BETTER * missInPixels(two, places) ? two : null;
}

function statedForOne(
  places: readonly KnownPlace[],
  fit: FittedSection,
  setOut: EntityOf<'setOut'>,
  scalePerPx: number | null,
): TwoScales | null {
  if (scalePerPx === null || isStated(fit.along, scalePerPx)) return null;
  const level = fitTwoScales(places, upTurn(setOut));
  if (level === null || !areUnequal(level)) return null;
  return isStated(level.along, scalePerPx) || isStated(level.up, scalePerPx) ? level : null;
}

function isStated(unitsPerPx: number, scalePerPx: number): boolean {
  return Math.abs(unitsPerPx / scalePerPx - 1) <= STATED_PART;
}

function areUnequal({ along, up }: TwoScales): boolean {
  return Math.abs(Math.log(along / up)) > UNEQUAL_PART;
}

function mustBeDeclared({ along, up }: TwoScales): Finding {
  return makeFinding(
    'wrong',
    'scalesUnequal',
    `The known points speak for two scales, ${plainText(along, 3)} along and ${plainText(up, 3)} upwards to the pixel. Check the typed values; if the drawing has two scales, declare them as plotting exaggeration or as a transformed section.`,
    { cell: 'scale' },
  );
}

function questionTurn({ rotation }: FittedSection): Finding[] {
  const quarter = Math.PI / 2;
  const off = ((rotation - quarter * Math.round(rotation / quarter)) * 180) / Math.PI;
  if (Math.abs(off) <= TURN_DEG) return [];
  return [
    makeFinding(
      'question',
      'sheetTurnedFar',
      `By two known points the section is turned by ${fixedText(Math.abs(off), 1)}° on the sheet. If the sheet is straighter than that, a value is mistyped or the drawing has two scales: mark a third known point.`,
      { cell: 'scale' },
    ),
  ];
}
