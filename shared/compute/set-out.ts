import { makeFinding } from '#shared/compute/findings.ts';
import { type SectionMap, sectionMapOf } from '#shared/compute/section-map.ts';
import { fitByDistance } from '#shared/compute/set-out-distance.ts';
import { setOutFindings } from '#shared/compute/set-out-findings.ts';
import { fitByPoints } from '#shared/compute/set-out-points.ts';
import {
  type Similarity,
  similarityResidual,
  similarityRotation,
  similarityScale,
} from '#shared/compute/similarity.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { Finding, SetOutReading } from '#shared/contract/reading.ts';

const METRES_PER_INCH = 0.0254;

export type SetOut = {
  reading: SetOutReading;
  map: SectionMap | null;
  similarity: Similarity | null;
  findings: Finding[];
};

/** What a way of setting out comes to: a similarity, or the reason why there is none yet. */
export type SetOutFit =
  | { state: 'fitted'; similarity: Similarity; fitPoints: number }
  | { state: 'incomplete' | 'ambiguous' | 'refused'; finding: Finding };

const NOTHING: SetOutReading = {
  state: 'incomplete',
  unitsPerPx: null,
  rotationDeg: null,
  offsetsGrowLeft: null,
  residual: null,
  residuals: [],
  impliedScale: null,
};

/**
 * Sets the section of a document out from its known points: scale, rotation, handedness, residuals, and the map
 * between sheet and section.
 *
 * Clicks are base-raster pixels as given (y down), offsets and elevations the document's length unit; residuals are
 * fitted minus given in that unit. The parameters are worked out afresh each time and never stored. Degenerate
 * input is answered, not thrown: `incomplete` (too little typed), `ambiguous` (up or the side to which offsets grow
 * has to be said), `refused` (coincident points, contradictory answers).
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
  const points = entitiesOf(document, 'knownPoint');
  const fit = setOut.method === 'points' ? fitByPoints(points, setOut) : fitByDistance(points, setOut);
  if (fit.state !== 'fitted') return withoutMap(fit.state, fit.finding);
  return withMap(document, fit.similarity, fit.fitPoints, setOut);
}

function withoutMap(state: SetOutReading['state'], finding: Finding): SetOut {
  return { reading: { ...NOTHING, state }, map: null, similarity: null, findings: [finding] };
}

function withMap(
  document: FlowNetDocument,
  similarity: Similarity,
  fitPoints: number,
  setOut: EntityOf<'setOut'>,
): SetOut {
  const unitsPerPx = similarityScale(similarity);
  const { residuals, residual } = residualsOf(document, similarity, fitPoints);
  const { dpi } = document.sheet;
  const impliedScale =
    dpi === null ? null : (unitsPerPx * metresPerLengthUnit(document.unitSystem) * dpi) / METRES_PER_INCH;
  const figures = [residual, impliedScale, ...residuals.flatMap((each) => [each.offset, each.elevation])];
  if (!figures.every((figure) => figure === null || Number.isFinite(figure))) {
    return withoutMap('refused', tooLarge());
  }
  const findings = setOutFindings(document, setOut, similarity, residual, impliedScale);
  return {
    reading: {
      state: 'fitted',
      unitsPerPx,
      rotationDeg: (similarityRotation(similarity) * 180) / Math.PI,
      offsetsGrowLeft: similarity.mirrored,
      residual,
      residuals,
      impliedScale,
    },
    map: sectionMapOf(similarity),
    similarity,
    findings,
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

function residualsOf(document: FlowNetDocument, similarity: Similarity, fitPoints: number) {
  const residuals: SetOutReading['residuals'] = [];
  let square = 0;
  let counted = 0;
  for (const { id, value } of entitiesOf(document, 'knownPoint')) {
    if (value.offset === null || value.elevation === null) continue;
    const [offset, elevation] = similarityResidual(similarity, {
      sheet: value.at,
      section: [value.offset, value.elevation],
    });
    residuals.push({ id, offset, elevation });
    // Two points are met exactly by their own fit: counting them would only make the checks look better.
    if (value.use === 'fit' && fitPoints <= 2) continue;
    square += offset * offset + elevation * elevation;
    counted += 1;
  }
  return { residuals, residual: counted === 0 ? null : Math.sqrt(square / counted) };
}
