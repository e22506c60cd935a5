import { makeFinding } from '#shared/compute/findings.ts';
import { type KnownPlace, knownFigures } from '#shared/compute/known-places.ts';
import { fitAffine, shearDeg } from '#shared/compute/set-out-affine.ts';
import {
  type FitGrounds,
  type FittedSection,
  type SetOutFit,
  squaresOfMiss,
} from '#shared/compute/set-out-fit.ts';
import { fitProjective } from '#shared/compute/set-out-projective.ts';
import { unknownsOf } from '#shared/compute/set-out-unknowns.ts';
import { askUp, contradiction, departureFromUp, UPRIGHT_LIMIT } from '#shared/compute/set-out-up.ts';
import { fitSimilarity, similarityForward } from '#shared/compute/similarity.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';

/** How the picture of a drawing at one scale has lost its shape: the paper stretched, or it was photographed aslant. */
export type LostShape = 'stretchedPaper' | 'perspective';

/** Paper stretches by a few per cent at most; what differs by more is two scales or a mistyped value. */
const MOST_STRETCH = 0.05;
const MOST_SHEAR_DEG = 3;
/** The fit must miss the points so many times less than one scale does, for each figure that is left over. */
const BETTER = 2;

export function isLostShape(scales: EntityOf<'setOut'>['scales']): scales is LostShape {
  return scales === 'stretchedPaper' || scales === 'perspective';
}

export function lostShapeOf({ scales }: EntityOf<'setOut'>): LostShape | null {
  return isLostShape(scales) ? scales : null;
}

/** The fit of a shape through places; null when they do not determine it. */
export function fitOfShape(places: readonly KnownPlace[], shape: LostShape): FittedSection | null {
  return shape === 'stretchedPaper' ? fitAffine(places) : fitProjective(places);
}

/**
 * Sets a section out whose picture has lost its shape: by an affine map from three known points or more, by a projective
 * one from four or more. Clicks are base-raster pixels, typed values the document's length unit.
 */
export function fitByShape(
  places: readonly KnownPlace[],
  shape: LostShape,
  setOut: EntityOf<'setOut'>,
): SetOutFit {
  const figures = knownFigures(places);
  if (figures < unknownsOf(shape)) return tooFew(shape);
  const fit = fitOfShape(places, shape);
  if (fit === null) return undetermined(shape);
  if (departureFromUp(fit.rotation, setOut) > UPRIGHT_LIMIT)
    return setOut.upQuarterTurns === null ? askUp() : contradiction();
  if (setOut.offsetsGrow !== null && (setOut.offsetsGrow === 'left') !== fit.mirrored) return contradiction();
  return { state: 'fitted', fit, grounds: { redundant: figures - unknownsOf(shape), turnFromSheet: false } };
}

/**
 * Questions a shape that the known points do not bear out: with no figure left over only a check point checks it, one
 * scale that meets the points as well makes it needless, and paper does not stretch or slant by very much.
 */
export function questionShape(
  places: readonly KnownPlace[],
  shape: LostShape,
  fit: FittedSection,
  grounds: FitGrounds,
  hasCheckPoint: boolean,
): Finding[] {
  if (grounds.redundant === 0) return hasCheckPoint ? [] : [question('shapeUnchecked', UNCHECKED[shape])];
  const wrong = shape === 'stretchedPaper' ? tooMuchStretch(fit) : [];
  if (wrong.length > 0) return wrong;
  return isBetterThanOneScale(places, fit, grounds) ? [] : [question('shapeNotShown', NEEDLESS[shape])];
}

function tooMuchStretch({ along, up, map }: FittedSection): Finding[] {
  const stretch = Math.abs(along / up - 1);
  const shear = shearDeg(map.linear);
  if (stretch <= MOST_STRETCH && shear <= MOST_SHEAR_DEG) return [];
  const text = `By the known points the paper is stretched by ${fixedText(100 * stretch, 1)} % and aslant by ${fixedText(shear, 1)}°, which no paper is. Check the typed values; if the drawing has two scales, declare them.`;
  return [makeFinding('wrong', 'stretchTooGreat', text, { cell: 'scale' })];
}

/** By the mean square of what each fit misses for each figure that it leaves over. */
function isBetterThanOneScale(
  places: readonly KnownPlace[],
  fit: FittedSection,
  { redundant }: FitGrounds,
): boolean {
  const one = fitSimilarity(places, fit.mirrored);
  if (one === null) return true;
  const ofOne = places.reduce((sum, { sheet, section }) => {
    const [offset, elevation] = similarityForward(one, ...sheet);
    const across = (offset - (section[0] ?? offset)) / fit.along;
    const upwards = (elevation - (section[1] ?? elevation)) / fit.up;
    return sum + across * across + upwards * upwards;
  }, 0);
  const left = knownFigures(places) - 4;
  return ofOne / left > BETTER * BETTER * (squaresOfMiss(fit, places) / redundant);
}

const UNCHECKED: Record<LostShape, string> = {
  stretchedPaper:
    'Three known points are met exactly however the paper is stretched, so that a mistyped value does not show. Mark a fourth.',
  perspective:
    'Four known points are met exactly by some perspective, so that a mistyped value does not show. Mark a fifth.',
};
const NEEDLESS: Record<LostShape, string> = {
  stretchedPaper:
    'One scale meets the known points nearly as well: they do not show that the paper is stretched. Declare one scale, or mark further points.',
  perspective:
    'One scale meets the known points nearly as well: they do not show a perspective. Declare one scale, or mark further points.',
};

const question = (code: string, text: string) => makeFinding('question', code, text, { cell: 'scale' });

function tooFew(shape: LostShape): SetOutFit {
  const text =
    shape === 'stretchedPaper'
      ? 'Stretched paper is measured by three known points or more with offset and elevation, off one line. Mark a further point.'
      : 'A perspective is measured by four known points or more with offset and elevation, no three on one line. Mark a further point.';
  return {
    state: 'incomplete',
    finding: makeFinding('missing', 'setOutIncomplete', text, { cell: 'scale' }),
  };
}

function undetermined(shape: LostShape): SetOutFit {
  const text =
    shape === 'stretchedPaper'
      ? 'The known points lie on one line and do not tell how the paper is stretched. Mark a point off the line.'
      : 'The known points do not tell the perspective: three of four lie on one line, or a value is mistyped. Mark points near the corners of the section.';
  return { state: 'refused', finding: makeFinding('wrong', 'shapeUndetermined', text, { cell: 'scale' }) };
}
