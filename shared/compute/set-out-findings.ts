import { makeFinding } from '#shared/compute/findings.ts';
import { type Similarity, similarityForward, similarityScale } from '#shared/compute/similarity.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText, plainText } from '#shared/text/number-text.ts';
import { unitNames } from '#shared/text/unit-text.ts';

/** A stated drawing scale is questioned when the fit departs from it by more than this part. */
const SCALE_TOLERANCE = 0.02;
/** A residual is questioned beyond this part of the extent of the known points; paper shrinks by less. */
const RESIDUAL_PART = 0.01;

/**
 * Questions a set-out that fits but does not go together: a residual that no paper makes, values typed beside a
 * distance that deny it, a scale other than the stated one. `residual` in the document's length unit, null where there
 * is none; `impliedScale` the n of 1:n, null where the resolution is unknown.
 */
export function setOutFindings(
  document: FlowNetDocument,
  setOut: EntityOf<'setOut'>,
  similarity: Similarity,
  residual: number | null,
  impliedScale: number | null,
): Finding[] {
  return [
    ...scaleFindings(impliedScale, setOut.statedScale),
    ...(setOut.method === 'points'
      ? residualFindings(document, similarity, residual)
      : distanceFindings(document, similarity, setOut.distance ?? 0)),
  ];
}

/** One mistyped point among several shows in the residual alone: the fit spreads its error over all of them. */
function residualFindings(
  document: FlowNetDocument,
  similarity: Similarity,
  residual: number | null,
): Finding[] {
  const places = entitiesOf(document, 'knownPoint').map(({ value }) => value.at);
  const range = (axis: 0 | 1) =>
    Math.max(...places.map((at) => at[axis])) - Math.min(...places.map((at) => at[axis]));
  const extent = Math.hypot(range(0), range(1)) * similarityScale(similarity);
  if (residual === null || residual <= RESIDUAL_PART * extent) return [];
  const figure = `${fixedText(residual, 2)} ${unitNames(document.unitSystem).length}`;
  return [
    makeFinding(
      'question',
      'residualLarge',
      `The known points disagree by ${figure}, more than a hundredth of the distance between them. Check the typed values, the places clicked and whether both directions have one scale.`,
      { cell: 'residual' },
    ),
  ];
}

/** The fit by a distance takes one elevation and one offset; whatever else is typed has to agree with it. */
function distanceFindings(document: FlowNetDocument, similarity: Similarity, distance: number): Finding[] {
  const denied = entitiesOf(document, 'knownPoint').filter(({ value }) => {
    const [offset, elevation] = similarityForward(similarity, ...value.at);
    const off = Math.max(
      Math.abs(offset - (value.offset ?? offset)),
      Math.abs(elevation - (value.elevation ?? elevation)),
    );
    return off > RESIDUAL_PART * distance;
  });
  if (denied.length === 0) return [];
  return [
    makeFinding(
      'question',
      'distanceDenied',
      'A further offset or elevation typed at the known points does not agree with the distance and with what is said to be level. Check them, or set the section out by points.',
      { cell: 'scale', entityIds: denied.map(({ id }) => id), at: denied[0]?.value.at ?? null },
    ),
  ];
}

function scaleFindings(impliedScale: number | null, statedScale: number | null): Finding[] {
  if (impliedScale === null || statedScale === null || !(statedScale > 0)) return [];
  if (Math.abs(impliedScale / statedScale - 1) <= SCALE_TOLERANCE) return [];
  return [
    makeFinding(
      'question',
      'scaleDisagrees',
      `The known points make the scale 1:${plainText(impliedScale, 3)}, the drawing states 1:${plainText(statedScale, 6)}. Check the typed values, the dpi of the scan and whether the print was reduced.`,
      { cell: 'scale' },
    ),
  ];
}
