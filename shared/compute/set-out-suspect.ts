import { normalTail, studentTail } from '#shared/compute/doubt/tails.ts';
import { type KnownPlace, knownFigures } from '#shared/compute/known-places.ts';
import { type FittedSection, fittedBy, fittedByScales, squaresOfMiss } from '#shared/compute/set-out-fit.ts';
import { placeOf } from '#shared/compute/set-out-points.ts';
import { fitOfShape, isLostShape } from '#shared/compute/set-out-shape.ts';
import { unknownsOf } from '#shared/compute/set-out-unknowns.ts';
import { fitSimilarity } from '#shared/compute/similarity.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import { fitTwoScales } from '#shared/compute/two-scales.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';

type KnownPoint = { id: string; value: EntityOf<'knownPoint'> };

/** What the test of single points comes to. */
export type SuspectTest =
  /** Too few figures are typed: so many more would be needed for one point to be told from the others. */
  | { state: 'tooFew'; more: number }
  /** No point alone stands out. */
  | { state: 'none' }
  /** One point stands out: `missPx` by how much the others put it elsewhere, `w` the test's figure, 3.29 its bound. */
  | { state: 'suspect'; id: string; missPx: number; w: number };

/** Chance of a false alarm at one point, as Baarda takes it: w beyond 3.29. */
const FALSE_ALARM = 0.001;
/** Chance of a false alarm among all points when the points' own scatter is the measure. */
const FALSE_ALARM_OF_ALL = 0.05;
/** The statement of accuracy is never taken for finer than this, pixels (95 %): a click is not. */
const FINEST_PX = 0.2;
const PER_SIGMA = 1.96;

/** The model that was fitted, to fit it again without a point. */
export type FittedModel = {
  readonly fit: FittedSection;
  readonly scales: EntityOf<'setOut'>['scales'];
  readonly turnFromSheet: boolean;
};

/**
 * Looks for the one known point that alone spoils the set-out: each is left out in turn, the others are fitted again,
 * and the drop ΔS of the sum of squares (pixels²) is tested twice. Against the stated accuracy of the known points, as in
 * data snooping: w² = ΔS/σ², alarm beyond the 0.1 % point (3.29 for one coordinate, Baarda 1968, A testing procedure for
 * use in geodetic networks; for a point with two coordinates ΔS/σ² has two degrees of freedom). And against what the
 * other points themselves scatter: F = (ΔS/m)/(S₍ᵢ₎/(f − m)), the square of the externally studentised residual (Cook
 * and Weisberg 1982, Residuals and influence in regression, ch. 2), at 5 % shared among the points after Bonferroni. Both
 * must alarm, so that a statement that is too fine does not; with a single degree of freedom left the second is weak.
 * All known points of either use take part, as each may be the wrong one.
 */
export function suspectAmong(document: FlowNetDocument, model: FittedModel): SuspectTest {
  const points = entitiesOf(document, 'knownPoint').filter(
    ({ value }) => value.offset !== null || value.elevation !== null,
  );
  const places = points.map(placeOf);
  const freedom = knownFigures(places) - unknownsOf(model.scales, model.turnFromSheet);
  const most = Math.max(0, ...places.map((place) => knownFigures([place])));
  if (freedom - most < 1) return { state: 'tooFew', more: 1 + most - freedom };
  const whole = refitted(places, model);
  if (whole === null) return { state: 'none' };
  const stated = Math.max(singleInputs(document).count.knownPointAccuracyPx, FINEST_PX) / PER_SIGMA;
  const all = squaresOfMiss(whole, places);
  const found = points
    .map((point, i) => ({ ...tested(point, places, i, { model, freedom, all, stated }), id: point.id }))
    .filter(({ alarm }) => alarm)
    .sort((a, b) => b.w - a.w);
  const [worst] = found;
  return worst === undefined
    ? { state: 'none' }
    : { state: 'suspect', id: worst.id, missPx: worst.missPx, w: worst.w };
}

/** The same model through other places. */
function refitted(places: readonly KnownPlace[], model: FittedModel): FittedSection | null {
  const { rotation, mirrored } = model.fit;
  const turn = model.turnFromSheet ? rotation : null;
  const grounds = { redundant: 0, turnFromSheet: model.turnFromSheet };
  if (isLostShape(model.scales)) return fitOfShape(places, model.scales);
  if (model.scales === 'equal') {
    const fit = fitSimilarity(places, mirrored, turn);
    const answer = fit === null ? null : fittedBy(fit, grounds);
    return answer?.state === 'fitted' ? answer.fit : null;
  }
  const fit = fitTwoScales(places, turn);
  const answer = fit === null || fit.mirrored !== mirrored ? null : fittedByScales(fit, grounds);
  return answer?.state === 'fitted' ? answer.fit : null;
}

type Grounds = { model: FittedModel; freedom: number; all: number; stated: number };

function tested(point: KnownPoint, places: readonly KnownPlace[], i: number, grounds: Grounds) {
  const nothing = { alarm: false, w: 0, missPx: 0 };
  const place = placeOf(point);
  const others = places.filter((_, k) => k !== i);
  const without = refitted(others, grounds.model);
  if (without === null) return nothing;
  const m = knownFigures([place]);
  const left = grounds.freedom - m;
  const squares = squaresOfMiss(without, others);
  const drop = Math.max(0, grounds.all - squares);
  const byStated = drop / grounds.stated ** 2;
  const byScatter = drop / m / (squares / left);
  const tailStated = m === 2 ? Math.exp(-byStated / 2) : normalTail(Math.sqrt(byStated));
  const tailScatter =
    m === 2 ? (1 + (2 * byScatter) / left) ** (-left / 2) : studentTail(Math.sqrt(byScatter), left);
  return {
    alarm: tailStated < FALSE_ALARM && tailScatter < FALSE_ALARM_OF_ALL / places.length,
    w: Math.sqrt(byStated / m),
    missPx: Math.sqrt(squaresOfMiss(without, [place])),
  };
}
