import { permeabilityPerSecond } from '#shared/compute/units.ts';
import { type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { NetReading, OutletReading, PointReading } from '#shared/contract/reading.ts';
import type {
  ExitReading,
  HeaveReading,
  ProfileReading,
  ProfileSample,
} from '#shared/contract/reading-quantities.ts';
import type { Figure, FigureGroup, FigureName, Quantity } from './figure-types.ts';

/**
 * Every figure that a reading gives, in the order of the record: inputs and quantities of the net, outlets, reading
 * points, profiles with their places, exits, heave. Lengths, levels, heads, pressures, unit weights and forces in the
 * document's units; permeabilities in its length unit per second; seepage per run of dam as the reading has it. Figures
 * are taken as they are, none is worked out. Never throws.
 */
export function figuresOf(net: { document: FlowNetDocument; reading: NetReading }): FigureGroup[] {
  const { reading } = net;
  const { outlets } = reading.quantities;
  return eachOnce([
    levelsOf(net.document),
    netOf(reading),
    // One outlet has what the net has.
    ...(outlets.length > 1 ? outlets.map(outletOf) : []),
    ...reading.points.map((point) => pointOf(point, reading)),
    ...reading.profiles.flatMap((profile) => [profileOf(profile), ...profile.samples.map(sampleOf(profile))]),
    ...reading.exits.map(exitOf),
    ...reading.stability.heave.map(heaveOf),
  ]);
}

/** A wall may stand beside one outlet twice: what shares an id is numbered, so that each is found again. */
function eachOnce(groups: readonly FigureGroup[]): FigureGroup[] {
  const seen = new Map<string, number>();
  return groups.map((each) => {
    const key = `${each.kind} ${each.id}`;
    const before = seen.get(key) ?? 0;
    seen.set(key, before + 1);
    return before === 0 ? each : { ...each, id: `${each.id} ${before + 1}` };
  });
}

const figure = (
  what: FigureName,
  quantity: Quantity,
  value: number | null,
  plusMinus: number | null = null,
): Figure => ({ what, quantity, value, plusMinus, digits: null });

const group = (
  kind: FigureGroup['kind'],
  id: string,
  name: string,
  figures: readonly Figure[],
): FigureGroup => ({ kind, id, name, status: 'read', reason: '', figures });

function levelsOf(document: FlowNetDocument): FigureGroup {
  const water = singleOf(document, 'waterLevels')?.value;
  const soil = singleOf(document, 'permeability')?.value;
  const permeability = (k: number | null | undefined) =>
    soil && k ? permeabilityPerSecond(k, soil.unit, document.unitSystem) : null;
  return group('levels', 'levels', '', [
    figure('headwater', 'elevation', water?.headwater ?? null, water?.headwaterPlusMinus ?? null),
    figure('tailwater', 'elevation', water?.tailwater ?? null, water?.tailwaterPlusMinus ?? null),
    figure('gammaW', 'unitWeight', water?.gammaW ?? null, water?.gammaWPlusMinus ?? null),
    figure('k', 'permeability', permeability(soil?.k)),
    figure('kv', 'permeability', permeability(soil?.kv)),
  ]);
}

function netOf({ quantities, setOut, doubt, netCheck, stability }: NetReading): FigureGroup {
  const seepage = figure('seepage', 'seepage', quantities.seepage);
  return group('net', 'net', '', [
    figure('drops', 'count', quantities.drops),
    figure('channels', 'count', quantities.channels),
    figure('shapeFactor', 'count', quantities.shapeFactor),
    figure('headLost', 'length', quantities.headLost, doubt.headLost),
    figure('headPerDrop', 'length', quantities.headPerDrop, doubt.headPerDrop),
    { ...seepage, digits: quantities.seepageFigures },
    figure('seepageFactor', 'factor', doubt.seepageFactor),
    figure('scale', 'scale', setOut.unitsPerPx),
    figure('residual', 'length', setOut.residual),
    figure('poorCells', 'count', netCheck?.summary.cellsPoor ?? null),
    figure('poorAngles', 'count', netCheck?.summary.anglesPoor ?? null),
    figure('poorChannels', 'count', netCheck?.summary.channelsPoor ?? null),
    figure('creepRatio', 'factor', stability.creep?.weightedRatio ?? null),
  ]);
}

const outletOf = ({ id, label, head, headLost, drops, channels, seepage }: OutletReading) =>
  group('outlet', id, label, [
    figure('outletHead', 'totalHead', head),
    figure('headLost', 'length', headLost),
    figure('drops', 'count', drops),
    figure('channels', 'count', channels),
    figure('seepage', 'seepage', seepage),
  ]);

function pointOf(point: PointReading, { measured }: NetReading): FigureGroup {
  const beside = measured.find(({ id }) => id === point.id);
  const { totalHeadPlusMinus, pressureHeadPlusMinus, porePressurePlusMinus } = point;
  const figures = [
    figure('offset', 'offset', point.offset),
    figure('elevation', 'elevation', point.elevation),
    figure('dropsLost', 'drops', point.dropsLost),
    figure('totalHead', 'totalHead', point.totalHead, totalHeadPlusMinus),
    figure('pressureHead', 'length', point.pressureHead, pressureHeadPlusMinus),
    figure('porePressure', 'pressure', point.porePressure, porePressurePlusMinus),
    ...(beside
      ? [figure('measuredDifference', 'length', beside.difference, beside.differencePlusMinus)]
      : []),
  ];
  const { id, name, status, reason } = point;
  return { kind: 'point', id, name, status, reason: reason?.text ?? '', figures };
}

function profileOf({ id, name, samples, uplift }: ProfileReading): FigureGroup {
  const [total, excess] = [uplift?.total ?? null, uplift?.excess ?? null];
  const pressures = samples.flatMap(({ porePressure }) => (porePressure === null ? [] : [porePressure]));
  return group('profile', id, name, [
    figure('greatestPressure', 'pressure', pressures.length === 0 ? null : Math.max(...pressures)),
    figure('uplift', 'force', total?.size ?? null, total?.plusMinus ?? null),
    figure('upliftUp', 'force', total?.vertical ?? null),
    figure('upliftSideways', 'force', total?.horizontal ?? null),
    figure('upliftArm', 'length', total?.arm ?? null),
    figure('excess', 'force', excess?.size ?? null, excess?.plusMinus ?? null),
    figure('excessUp', 'force', excess?.vertical ?? null),
  ]);
}

/** A place is known by its number along the profile: of a document that is read again it is the same place. */
const sampleOf = (profile: ProfileReading) => (sample: ProfileSample, index: number) => ({
  ...group('sample', `${profile.id} ${index}`, `${profile.name} ${index + 1}`.trim(), [
    figure('totalHead', 'totalHead', sample.totalHead, sample.totalHeadPlusMinus),
    figure('porePressure', 'pressure', sample.porePressure, sample.porePressurePlusMinus),
    figure('ru', 'ratio', sample.ru),
  ]),
  status: sample.status,
  reason: sample.reason?.text ?? '',
});

const exitOf = (exit: ExitReading, index: number) =>
  group('exit', `${exit.outlet} ${exit.before} ${exit.left} ${exit.right}`, String(index + 1), [
    figure('cellGradient', 'ratio', exit.cellGradient, exit.cellGradientPlusMinus),
    figure('pointGradient', 'ratio', exit.pointGradient),
    figure('exitFactor', 'ratio', exit.factor),
    figure('pointFactor', 'ratio', exit.pointFactor),
    figure('seepageForce', 'unitWeight', exit.seepageForce),
  ]);

const heaveOf = (heave: HeaveReading, index: number) =>
  group('heave', `${heave.wall} ${heave.outlet}`, String(index + 1), [
    figure('excessHead', 'length', heave.meanExcessHead, heave.meanExcessHeadPlusMinus),
    figure('heaveFactor', 'ratio', heave.factor),
  ]);
