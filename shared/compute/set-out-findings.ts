import { makeFinding } from '#shared/compute/findings.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { FitGrounds, FittedSection } from '#shared/compute/set-out-fit.ts';
import { controlPlaces } from '#shared/compute/set-out-points.ts';
import { lostShapeOf, questionShape } from '#shared/compute/set-out-shape.ts';
import { suspectAmong } from '#shared/compute/set-out-suspect.ts';
import { questionEqualScales } from '#shared/compute/set-out-unequal.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';
import { fixedText, plainText } from '#shared/text/number-text.ts';
import { unitNames } from '#shared/text/unit-text.ts';

/** A stated drawing scale is questioned when the fit departs from it by more than this part. */
const SCALE_TOLERANCE = 0.02;
/** A residual is questioned beyond this part of the extent of the known points; paper shrinks by less. */
const RESIDUAL_PART = 0.01;

/** Declared scales that differ by less than this part are equal. */
const EQUAL_PART = 0.01;

type SetOutFigures = {
  readonly grounds: FitGrounds;
  readonly residual: number | null;
  readonly impliedScale: number | null;
};

/**
 * Questions a set-out that fits but does not go together: a residual that no paper makes, values typed beside a
 * distance that deny it, one point that alone spoils the fit, a scale bar that denies it, scales that are not as
 * declared, a scale other than the stated one. `residual` in the document's length unit, null where there is none;
 * `impliedScale` the n of 1:n along the level, null where the resolution is unknown.
 */
export function setOutFindings(
  document: FlowNetDocument,
  setOut: EntityOf<'setOut'>,
  fit: FittedSection,
  { grounds, residual, impliedScale }: SetOutFigures,
): Finding[] {
  if (setOut.method === 'distance') {
    return [
      ...scaleFindings(impliedScale, setOut.statedScale, fit),
      ...distanceFindings(document, fit.map, setOut.distance ?? 0),
    ];
  }
  const unequal = setOut.scales === 'equal' ? equalScaleFindings(document, setOut, fit, impliedScale) : [];
  if (unequal.some(({ weight }) => weight === 'wrong')) return unequal;
  return [
    ...unequal,
    ...(setOut.scales === 'equal' ? [] : declaredFindings(document, setOut, fit, grounds)),
    ...scaleFindings(impliedScale, setOut.statedScale, fit),
    ...residualFindings(document, fit.map, residual),
    ...suspectFindings(document, setOut, fit, grounds),
    ...scaleBarFindings(document, setOut, fit.map),
  ];
}

function equalScaleFindings(
  document: FlowNetDocument,
  setOut: EntityOf<'setOut'>,
  fit: FittedSection,
  impliedScale: number | null,
): Finding[] {
  const { statedScale } = setOut;
  const scalePerPx =
    impliedScale === null || statedScale === null || !(statedScale > 0)
      ? null
      : (fit.along * statedScale) / impliedScale;
  return questionEqualScales(controlPlaces(entitiesOf(document, 'knownPoint')), fit, setOut, scalePerPx);
}

function declaredFindings(
  document: FlowNetDocument,
  setOut: EntityOf<'setOut'>,
  fit: FittedSection,
  grounds: FitGrounds,
): Finding[] {
  const shape = lostShapeOf(setOut);
  if (shape === null) return twoScaleFindings(fit);
  const points = entitiesOf(document, 'knownPoint');
  const hasCheckPoint = points.some(
    ({ value }) => value.use === 'check' && value.offset !== null && value.elevation !== null,
  );
  return questionShape(controlPlaces(points), shape, fit, grounds, hasCheckPoint);
}

function twoScaleFindings({ along, up }: FittedSection): Finding[] {
  if (Math.abs(along / up - 1) > EQUAL_PART) return [];
  return [
    makeFinding(
      'question',
      'scalesEqual',
      'The drawing is declared to have two scales, but by the known points both are one. Check the typed values and what is declared.',
      { cell: 'scale' },
    ),
  ];
}

/** One mistyped point among several shows in the residual alone: the fit spreads its error over all of them. */
function residualFindings(document: FlowNetDocument, map: SectionMap, residual: number | null): Finding[] {
  const places = entitiesOf(document, 'knownPoint').map(({ value }) => value.at);
  const range = (axis: 0 | 1) =>
    Math.max(...places.map((at) => at[axis])) - Math.min(...places.map((at) => at[axis]));
  const extent = Math.hypot(range(0), range(1)) * map.unitsPerPx;
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

function suspectFindings(
  document: FlowNetDocument,
  setOut: EntityOf<'setOut'>,
  fit: FittedSection,
  { turnFromSheet }: FitGrounds,
): Finding[] {
  const test = suspectAmong(document, { fit, scales: setOut.scales, turnFromSheet });
  if (test.state !== 'suspect') return [];
  const point = document.entities[test.id]?.value;
  if (point?.kind !== 'knownPoint') return [];
  return [
    makeFinding(
      'question',
      'knownPointSuspect',
      `${point.name || 'One known point'} alone spoils the fit: the other known points agree and put it ${fixedText(test.missPx, 1)} px from its mark (w = ${fixedText(test.w, 1)}, bound 3.3). Check its typed values and its mark.`,
      { cell: 'residual', entityIds: [test.id], at: point.at },
    ),
  ];
}

/** Two known points without offset and elevation, with a length between them, are a scale bar that checks the fit. */
export function scaleBarOf(
  document: FlowNetDocument,
  setOut: EntityOf<'setOut'>,
  map: SectionMap,
): { fitted: number; stated: number; ids: [string, string] } | null {
  if (setOut.method !== 'points' || setOut.distance === null || !(setOut.distance > 0)) return null;
  const [first, second] = entitiesOf(document, 'knownPoint').filter(
    ({ value }) => value.offset === null && value.elevation === null,
  );
  if (first === undefined || second === undefined) return null;
  const from = map.toSection(sheetPx(...first.value.at));
  const to = map.toSection(sheetPx(...second.value.at));
  return {
    fitted: Math.hypot(to[0] - from[0], to[1] - from[1]),
    stated: setOut.distance,
    ids: [first.id, second.id],
  };
}

function scaleBarFindings(document: FlowNetDocument, setOut: EntityOf<'setOut'>, map: SectionMap): Finding[] {
  const bar = scaleBarOf(document, setOut, map);
  if (bar === null || Math.abs(bar.fitted / bar.stated - 1) <= SCALE_TOLERANCE) return [];
  const unit = unitNames(document.unitSystem).length;
  return [
    makeFinding(
      'question',
      'scaleBarDisagrees',
      `The scale bar states ${plainText(bar.stated, 6)} ${unit} and is ${plainText(bar.fitted, 4)} ${unit} by the known points. Check its ends, its length, the typed values and whether both directions have one scale.`,
      { cell: 'scale', entityIds: bar.ids },
    ),
  ];
}

/** The fit by a distance takes one elevation and one offset; whatever else is typed has to agree with it. */
function distanceFindings(document: FlowNetDocument, map: SectionMap, distance: number): Finding[] {
  const denied = entitiesOf(document, 'knownPoint').filter(({ value }) => {
    const [offset, elevation] = map.toSection(sheetPx(...value.at));
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

/** On a drawing of two scales the stated one may be either. */
function scaleFindings(
  impliedScale: number | null,
  statedScale: number | null,
  { along, up }: FittedSection,
): Finding[] {
  if (impliedScale === null || statedScale === null || !(statedScale > 0)) return [];
  const implied = [impliedScale, (impliedScale * up) / along];
  if (implied.some((scale) => Math.abs(scale / statedScale - 1) <= SCALE_TOLERANCE)) return [];
  return [
    makeFinding(
      'question',
      'scaleDisagrees',
      `The known points make the scale 1:${plainText(impliedScale, 3)}, the drawing states 1:${plainText(statedScale, 6)}. Check the typed values, the dpi of the scan and whether the print was reduced.`,
      { cell: 'scale' },
    ),
  ];
}
