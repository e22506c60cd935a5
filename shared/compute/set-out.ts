import { makeFinding } from '#shared/compute/findings.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { fitByDistance } from '#shared/compute/set-out-distance.ts';
import { setOutFindings } from '#shared/compute/set-out-findings.ts';
import type { FitGrounds, FittedSection, SetOutFit } from '#shared/compute/set-out-fit.ts';
import { fitByPoints } from '#shared/compute/set-out-points.ts';
import { distanceGivesOneScale } from '#shared/compute/set-out-scales.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { Finding, SetOutReading } from '#shared/contract/reading.ts';

const METRES_PER_INCH = 0.0254;
/**
 * Length units that a pixel is worth at least. A model of a hand's breadth scanned at 600 dpi has 4e-5 m; far below it a
 * value is mistyped, and in the end the squares of the scale are too small to be told from nothing.
 */
const LEAST_UNITS_PER_PX = 1e-9;

export type SetOut = {
  reading: SetOutReading;
  map: SectionMap | null;
  /** kh/kv that unequal scales imply where the section is drawn transformed; null elsewhere. */
  impliedRatio: number | null;
  /** What was fitted and how it was come by; null while there is none. */
  fit: FittedSection | null;
  grounds: FitGrounds | null;
  findings: Finding[];
};

const NOTHING: SetOutReading = {
  state: 'incomplete',
  unitsPerPx: null,
  unitsPerPxUp: null,
  exaggeration: null,
  rotationDeg: null,
  offsetsGrowLeft: null,
  residual: null,
  residuals: [],
  impliedScale: null,
  placeDoubt: null,
};

/**
 * Sets the section of a document out from its known points: scale, rotation, handedness, residuals, and the map
 * between sheet and section. One scale, or two where the drawing is declared to have two.
 *
 * Clicks are base-raster pixels as given (y down), offsets and elevations the document's length unit; residuals are
 * fitted minus given in that unit. The parameters are worked out afresh each time and never stored. Degenerate
 * input is answered, not thrown: `incomplete` (too little typed), `ambiguous` (up or the side to which offsets grow
 * has to be said), `refused` (coincident points, contradictory answers, a scale that no drawing has).
 */
export function readSetOut(document: FlowNetDocument): SetOut {
  const setOut = singleOf(document, 'setOut')?.value ?? null;
  if (setOut === null) {
    return withoutMap(
      'incomplete',
      makeFinding(
        'missing',
        'setOutMissing',
        'The section has not been set out. Mark two known points on the drawing.',
        {
          cell: 'scale',
        },
      ),
    );
  }
  const fit = fitOf(document, setOut);
  if (fit.state !== 'fitted') return withoutMap(fit.state, fit.finding);
  return withMap(document, fit.fit, fit.grounds, setOut);
}

/** The map of a section alone, without what is to be said of it; null while it is not set out. */
export function fittedMap(document: FlowNetDocument): SectionMap | null {
  const setOut = singleOf(document, 'setOut')?.value ?? null;
  const fit = setOut === null ? null : fitOf(document, setOut);
  return fit?.state === 'fitted' ? fit.fit.map : null;
}

function fitOf(document: FlowNetDocument, setOut: EntityOf<'setOut'>): SetOutFit {
  const fit = fitByMethod(entitiesOf(document, 'knownPoint'), setOut);
  return fit.state === 'fitted' && Math.min(fit.fit.along, fit.fit.up) < LEAST_UNITS_PER_PX
    ? { state: 'refused', finding: tooSmall() }
    : fit;
}

function fitByMethod(
  points: ReturnType<typeof entitiesOf<'knownPoint'>>,
  setOut: EntityOf<'setOut'>,
): SetOutFit {
  if (setOut.method === 'points') return fitByPoints(points, setOut);
  return setOut.scales === 'equal' ? fitByDistance(points, setOut) : distanceGivesOneScale();
}

function withoutMap(state: SetOutReading['state'], finding: Finding): SetOut {
  return {
    reading: { ...NOTHING, state },
    map: null,
    impliedRatio: null,
    fit: null,
    grounds: null,
    findings: [finding],
  };
}

function withMap(
  document: FlowNetDocument,
  fit: FittedSection,
  grounds: FitGrounds,
  setOut: EntityOf<'setOut'>,
): SetOut {
  const { residuals, residual } = residualsOf(document, fit.map, grounds.redundant);
  const { dpi } = document.sheet;
  const impliedScale =
    dpi === null ? null : (fit.along * metresPerLengthUnit(document.unitSystem) * dpi) / METRES_PER_INCH;
  const figures = [
    fit.along,
    fit.up,
    fit.along / fit.up,
    residual,
    impliedScale,
    ...residuals.flatMap((each) => [each.offset, each.elevation]),
  ];
  if (!figures.every((figure) => figure === null || Number.isFinite(figure))) {
    return withoutMap('refused', tooLarge());
  }
  return {
    reading: {
      state: 'fitted',
      unitsPerPx: fit.along,
      unitsPerPxUp: fit.up,
      exaggeration: fit.along / fit.up,
      rotationDeg: (fit.rotation * 180) / Math.PI,
      offsetsGrowLeft: fit.mirrored,
      residual,
      residuals,
      impliedScale,
      // Worked out with the whole reading: it sets the section out again for every coordinate of every point.
      placeDoubt: null,
    },
    map: fit.map,
    fit,
    grounds,
    impliedRatio: setOut.scales === 'transformedSection' ? (fit.along / fit.up) ** 2 : null,
    findings: setOutFindings(document, setOut, fit, { grounds, residual, impliedScale }),
  };
}

function tooLarge(): Finding {
  return makeFinding(
    'wrong',
    'setOutTooLarge',
    'The typed values of the known points are too large to be worked out. Check them.',
    { cell: 'scale' },
  );
}

function tooSmall(): Finding {
  return makeFinding(
    'wrong',
    'setOutTooSmall',
    'By the typed values of the known points a pixel is worth next to nothing. Check them, and the unit in which they are typed.',
    { cell: 'scale' },
  );
}

function residualsOf(document: FlowNetDocument, map: SectionMap, redundant: number) {
  const residuals: SetOutReading['residuals'] = [];
  let square = 0;
  let counted = 0;
  for (const { id, value } of entitiesOf(document, 'knownPoint')) {
    if (value.offset === null && value.elevation === null) continue;
    const fitted = map.toSection(sheetPx(...value.at));
    const offset = value.offset === null ? null : fitted[0] - value.offset;
    const elevation = value.elevation === null ? null : fitted[1] - value.elevation;
    residuals.push({ id, offset, elevation });
    // A fit that needs every figure meets them all exactly: counting them would only make the checks look better.
    if (value.use === 'fit' && redundant <= 0) continue;
    square += (offset ?? 0) ** 2 + (elevation ?? 0) ** 2;
    counted += 1;
  }
  return { residuals, residual: counted === 0 ? null : Math.sqrt(square / counted) };
}
