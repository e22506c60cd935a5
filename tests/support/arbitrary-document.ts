import fc from 'fast-check';
import type { DocumentEntity, FlowNetDocument, LineKind } from '#shared/contract/document.ts';
import { MAX_FIGURE, MAX_PERMEABILITY, MAX_SHEET_PX } from '#shared/contract/limits.ts';
import { entityIdOf, exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const KINDS: LineKind[] = [
  'equipotential',
  'flowLine',
  'phreaticLine',
  'impervious',
  'soilBoundary',
  'ground',
  'submergedFace',
  'outflowFace',
  'drain',
];

/** Numbers within ±`most`, ordinary ones more often than monsters. */
const numbersTo = (most: number) =>
  fc.oneof(
    { weight: 6, arbitrary: fc.integer({ min: -5, max: 20 }).map((value) => value * 50) },
    { weight: 3, arbitrary: fc.double({ min: -1e4, max: 1e4, noNaN: true }) },
    { weight: 1, arbitrary: fc.double({ min: -most, max: most, noNaN: true }) },
  );
const positiveTo = (most: number) =>
  fc.oneof(
    fc.double({ min: 0.01, max: 100, noNaN: true }),
    fc.double({ min: Number.MIN_VALUE, max: most, noNaN: true }),
  );
/** Any offset, elevation or head that the schema admits, any other figure, any place on the sheet. */
const anyNumber = numbersTo(MAX_FIGURE);
const positive = positiveTo(MAX_FIGURE);
const place = fc.tuple(numbersTo(MAX_SHEET_PX), numbersTo(MAX_SHEET_PX));
const plusMinus = fc.oneof(fc.constant(0), positive);
const maybe = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: null });

const knownPoint = fc.record({
  kind: fc.constant('knownPoint' as const),
  name: fc.string({ maxLength: 10 }),
  at: place,
  offset: maybe(anyNumber),
  elevation: maybe(anyNumber),
  use: fc.constantFrom('fit' as const, 'check' as const),
});

const line = fc.record({
  kind: fc.constant('line' as const),
  line: fc.constantFrom(...KINDS),
  name: fc.string({ maxLength: 10 }),
  points: fc.array(place, { maxLength: 8 }),
  finished: fc.boolean(),
  water: maybe(fc.constantFrom('headwater' as const, 'tailwater' as const)),
  head: maybe(anyNumber),
  drops: maybe(anyNumber),
  origin: fc.constantFrom('traced' as const, 'guessed' as const, 'adopted' as const),
});

const readingPoint = fc.record({
  kind: fc.constant('readingPoint' as const),
  name: fc.string({ maxLength: 10 }),
  place: fc.oneof(
    fc.record({ on: fc.constant('sheet' as const), at: place }),
    fc.record({ on: fc.constant('section' as const), offset: anyNumber, elevation: anyNumber }),
  ),
  order: fc.double({ noNaN: true, noDefaultInfinity: true }),
  elevationPlusMinus: maybe(plusMinus),
  measured: maybe(
    fc.record({
      value: anyNumber,
      as: fc.constantFrom('totalHead' as const, 'pressureHead' as const, 'porePressure' as const),
      plusMinus: maybe(plusMinus),
      on: fc.constant(''),
    }),
  ),
});

const sectionPlace = fc.tuple(anyNumber, anyNumber);
const profile = fc.record({
  kind: fc.constant('profile' as const),
  name: fc.string({ maxLength: 10 }),
  use: fc.constantFrom(
    'base' as const,
    'slipSurface' as const,
    'filterBoundary' as const,
    'borehole' as const,
    'other' as const,
  ),
  place: fc.oneof(
    fc.record({ on: fc.constant('sheet' as const), points: fc.array(place, { maxLength: 6 }) }),
    fc.record({ on: fc.constant('section' as const), points: fc.array(sectionPlace, { maxLength: 6 }) }),
    fc.record({ on: fc.constant('grid' as const), corners: fc.tuple(sectionPlace, sectionPlace) }),
  ),
  spacing: maybe(positive),
  finished: fc.boolean(),
  order: fc.double({ noNaN: true, noDefaultInfinity: true }),
});

const soilProperties = {
  k: maybe(positiveTo(MAX_PERMEABILITY)),
  kv: maybe(positiveTo(MAX_PERMEABILITY)),
  dipDeg: fc.double({ min: -90, max: 90, noNaN: true }),
  unit: fc.constantFrom('m/s' as const, 'ft/year' as const),
  factor: maybe(fc.double({ min: 1, max: 1e6, noNaN: true })),
  saturatedUnitWeight: maybe(positive),
  moistUnitWeight: maybe(positive),
  specificGravity: maybe(positive),
  voidRatio: maybe(positive),
  source: fc.constant(''),
};
const soil = fc.record({
  kind: fc.constant('soil' as const),
  name: fc.string({ maxLength: 10 }),
  places: fc.array(place, { maxLength: 3 }),
  ...soilProperties,
});

const singles: fc.Arbitrary<DocumentEntity>[] = [
  fc.record({
    kind: fc.constant('setOut' as const),
    method: fc.constantFrom('points' as const, 'distance' as const),
    distance: maybe(anyNumber),
    level: fc.constantFrom('line' as const, 'sheet' as const),
    offsetsGrow: maybe(fc.constantFrom('left' as const, 'right' as const)),
    upstream: maybe(fc.constantFrom('left' as const, 'right' as const)),
    upQuarterTurns: maybe(fc.constantFrom(0 as const, 1 as const, 2 as const, 3 as const)),
    statedScale: maybe(anyNumber),
    scales: fc.constantFrom('equal' as const, 'plottingExaggeration' as const, 'transformedSection' as const),
  }),
  fc.record({
    kind: fc.constant('waterLevels' as const),
    headwater: maybe(anyNumber),
    tailwater: maybe(anyNumber),
    gammaW: fc.oneof(fc.constantFrom(9.81, 62.4), positive),
    source: fc.constant(''),
    headwaterPlusMinus: maybe(plusMinus),
    tailwaterPlusMinus: maybe(plusMinus),
    gammaWPlusMinus: maybe(plusMinus),
    datumPlusMinus: maybe(plusMinus),
  }),
  fc.record({ kind: fc.constant('permeability' as const), ...soilProperties }),
  fc.record({
    kind: fc.constant('netCount' as const),
    drops: maybe(positive),
    channels: maybe(positive),
    cellRatio: positive,
    countedIn: fc.constant(null),
    tracingAccuracyPx: fc.oneof(fc.constant(0), positive),
    knownPointAccuracyPx: fc.oneof(fc.constant(0), positive),
  }),
];

function documentOf(values: readonly DocumentEntity[], unitSystem: 'SI' | 'US'): FlowNetDocument {
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: entityIdOf(0xabcd),
    name: '',
    unitSystem,
    datum: '',
    sheet: { widthPx: 1000, heightPx: 800, dpi: 300 },
    entities: Object.fromEntries(
      values.map((value, i) => [entityIdOf(i + 1), { id: entityIdOf(i + 1), version: 1, value }]),
    ),
  };
}

/** A document of any entities at all, most of them nonsense together. */
const nonsense = fc
  .tuple(
    fc.array(fc.oneof(knownPoint, line, line, line, readingPoint, profile, soil), { maxLength: 25 }),
    fc.tuple(...singles),
    fc.constantFrom('SI' as const, 'US' as const),
  )
  .map(([entities, single, system]) => documentOf([...entities, ...single], system));

/** An exact net in which some entities are replaced by nonsense: nearly right is where code breaks. */
const damaged = fc
  .tuple(
    fc.constantFrom(...EXACT_NETS),
    fc.array(fc.tuple(fc.nat(200), fc.oneof(knownPoint, line, readingPoint, profile, soil, ...singles)), {
      maxLength: 3,
    }),
    fc.array(readingPoint, { maxLength: 3 }),
  )
  .map(([{ net, pxPerUnit }, swaps, points]) => {
    const values = Object.values(exactNetDocument(net, { pxPerUnit, spacingPx: 60 }).entities).map(
      (entity) => entity.value,
    );
    for (const [at, value] of swaps) values[at % values.length] = value;
    return documentOf([...values, ...points], 'SI');
  });

/** Any document that the schema admits. */
export function arbitraryDocument(): fc.Arbitrary<FlowNetDocument> {
  return fc.oneof(nonsense, damaged);
}
