import type { DocumentEntity, EntityKind, EntityOf, FlowNetDocument } from '#shared/contract/document.ts';
import { singleOf } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import type {
  Change,
  ChangedFact,
  ComparedPoint,
  FigurePair,
  LineChange,
  PointChange,
  RevisionComparison,
} from '#shared/contract/revision-comparison.ts';
import { distanceToPolyline, type Polyline, polylineOf } from './geometry/polyline.ts';
import type { Pair } from './geometry/predicates.ts';
import { isSameFigure } from './same-figure.ts';

/** A net as frozen: its document and the reading of it. */
export interface FrozenNet {
  document: FlowNetDocument;
  reading: NetReading;
}

/** Pixels below which a line counts as where it was: rounding of stored coordinates, far below what a hand can place. */
const STILL_PX = 0.05;

/**
 * What changed from one net to a later one. Entities are the same where they have the same id, as in revisions of one
 * net. Places are in base-raster pixels, lengths, heads and pressures in the later document's units; figures are taken
 * as they are from both readings, so that they compare only where both documents use the same unit system.
 */
export function compareRevisions(before: FrozenNet, after: FrozenNet): RevisionComparison {
  return {
    lines: lineChanges(before, after),
    points: pointChanges(before, after),
    inputs: inputChanges(before.document, after.document),
    quantities: changedFacts(quantityFacts(before.reading), quantityFacts(after.reading)),
    figures: comparedPoints(before.reading, after.reading),
  };
}

/** The entities of a kind by id, in the order of their ids. */
function ofKind<K extends EntityKind>({ entities }: FlowNetDocument, kind: K): Map<string, EntityOf<K>> {
  return new Map(
    Object.entries(entities)
      .filter(([, { value }]) => value.kind === kind)
      .map(([id, { value }]) => [id, value as EntityOf<K> & DocumentEntity] as const)
      .sort(([a], [b]) => (a < b ? -1 : 1)),
  );
}

const changeOf = (before: unknown, after: unknown): Change =>
  before === undefined ? 'added' : after === undefined ? 'removed' : 'changed';

const idsOf = (before: ReadonlyMap<string, unknown>, after: ReadonlyMap<string, unknown>) => [
  ...new Set([...after.keys(), ...before.keys()]),
];

function lineChanges(before: FrozenNet, after: FrozenNet): LineChange[] {
  const [were, are] = [ofKind(before.document, 'line'), ofKind(after.document, 'line')];
  return idsOf(were, are).flatMap((id) => {
    const [was, is] = [were.get(id), are.get(id)];
    const shown = is ?? was;
    if (!shown) return [];
    const movedPx = was && is ? greatestDistance(was.points, is.points) : null;
    const facts = was && is ? changedFacts(lineFacts(was), lineFacts(is)) : [];
    if (movedPx !== null && movedPx <= STILL_PX && facts.length === 0) return [];
    const { line, name } = shown;
    const moved = inLength(movedPx, after.reading);
    const drops = line === 'equipotential' ? dropsAt(is ? after.reading : before.reading, id) : null;
    const courses = { before: was?.points ?? [], after: is?.points ?? [] };
    return [{ id, change: changeOf(was, is), line, name, drops, movedPx, moved, facts, ...courses }];
  });
}

const dropsAt = ({ lines }: NetReading, id: string) => lines.find((line) => line.id === id)?.drops ?? null;

const lineFacts = ({ line, name, finished, water, head, drops }: EntityOf<'line'>) => ({
  Kind: line,
  Name: name,
  Finished: finished ? 'yes' : 'no',
  Water: water,
  Head: head,
  'Drops lost': drops,
});

/** Only where the drawing has one scale: elsewhere a distance depends on its direction. */
function inLength(px: number | null, { setOut: { unitsPerPx, unitsPerPxUp } }: NetReading): number | null {
  if (px === null || unitsPerPx === null) return null;
  const oneScale = unitsPerPxUp === null || Math.abs(unitsPerPxUp / unitsPerPx - 1) < 1e-9;
  return oneScale ? px * unitsPerPx : null;
}

type Course = readonly Pair[];

/**
 * Hausdorff distance between two polylines, taken at their vertices: how far the one strays from the other at most. A
 * vertex added on a straight piece moves nothing. Null where either is no line yet.
 */
export function greatestDistance(a: Course, b: Course): number | null {
  const [lineA, lineB] = [polylineOf(a), polylineOf(b)];
  if (lineA === null || lineB === null) return null;
  return Math.max(straying(a, lineB), straying(b, lineA));
}

const straying = (from: Course, to: Polyline) =>
  from.reduce((most, [x, y]) => Math.max(most, distanceToPolyline(to, x, y)), 0);

function pointChanges(before: FrozenNet, after: FrozenNet): PointChange[] {
  const [were, are] = [ofKind(before.document, 'readingPoint'), ofKind(after.document, 'readingPoint')];
  return idsOf(were, are).flatMap((id) => {
    const [was, is] = [were.get(id), are.get(id)];
    const shown = is ?? was;
    if (!shown) return [];
    const facts = was && is ? changedFacts(pointFacts(was, before, id), pointFacts(is, after, id)) : [];
    if (was && is && facts.length === 0) return [];
    return [{ id, change: changeOf(was, is), name: shown.name, facts }];
  });
}

function pointFacts({ name, place, measured }: EntityOf<'readingPoint'>, { reading }: FrozenNet, id: string) {
  const read = reading.points.find((point) => point.id === id);
  return {
    Name: name,
    'Place on the sheet, px': place.on === 'sheet' ? place.at.join(', ') : null,
    Offset: place.on === 'section' ? place.offset : (read?.offset ?? null),
    Elevation: place.on === 'section' ? place.elevation : (read?.elevation ?? null),
    Measured: measured === null ? null : `${measured.value} (${measured.as}, ${measured.on})`,
  };
}

function inputChanges(before: FlowNetDocument, after: FlowNetDocument): ChangedFact[] {
  return [
    ...changedFacts({ Datum: before.datum }, { Datum: after.datum }),
    ...(['waterLevels', 'permeability', 'netCount', 'setOut'] as const).flatMap((kind) =>
      changedFacts(inputFacts(singleOf(before, kind)?.value), inputFacts(singleOf(after, kind)?.value)),
    ),
    ...NAMED.flatMap(({ kind, word }) => namedChanges(ofKind(before, kind), ofKind(after, kind), word)),
  ];
}

/** Words of the inputs; what is not listed is no input that figures come from. */
const LABELS: Record<string, string> = {
  headwater: 'Headwater',
  tailwater: 'Tailwater',
  gammaW: 'Unit weight of water',
  source: 'Source of the levels',
  headwaterPlusMinus: '± of the headwater',
  tailwaterPlusMinus: '± of the tailwater',
  gammaWPlusMinus: '± of the unit weight',
  datumPlusMinus: '± of the datum',
  k: 'Permeability',
  kv: 'Permeability across the bedding',
  dipDeg: 'Dip of the bedding',
  unit: 'Unit of the permeability',
  factor: 'Factor within which the permeability is known',
  drops: 'Drops stated',
  channels: 'Channels stated',
  cellRatio: 'B/L of the cells',
  tracingAccuracyPx: 'Tracing accuracy, px',
  knownPointAccuracyPx: 'Accuracy of the known points, px',
  method: 'Way of setting out',
  distance: 'Known length',
  scales: 'Scales',
  statedScale: 'Stated scale',
};

function inputFacts(value: DocumentEntity | undefined): Facts {
  const entries = Object.entries(value ?? {}).filter(([key]) => key in LABELS);
  const label = (key: string) =>
    key === 'source' && value?.kind === 'permeability' ? 'Source of the permeability' : LABELS[key];
  return Object.fromEntries(entries.map(([key, fact]) => [label(key) ?? key, asFact(fact)]));
}

const asFact = (value: unknown): string | number | null =>
  typeof value === 'number' || typeof value === 'string' ? value : null;

const NAMED = [
  { kind: 'knownPoint', word: 'Known point' },
  { kind: 'soil', word: 'Soil' },
  { kind: 'profile', word: 'Profile' },
] as const;

type Named = ReadonlyMap<string, EntityOf<(typeof NAMED)[number]['kind']>>;

/** Known points, soils and profiles that are new, gone or different, each by its name. */
function namedChanges(were: Named, are: Named, word: string): ChangedFact[] {
  return idsOf(were, are).flatMap((id) => {
    const [was, is] = [were.get(id), are.get(id)];
    const [before, after] = [was && factText(was), is && factText(is)];
    if (before === after && was?.name === is?.name) return [];
    const label = `${word} ${(is ?? was)?.name ?? ''}`.trim();
    return [{ label, before: before ?? null, after: after ?? null }];
  });
}

/** All that is said of an entity, in one line; what is unsaid stays out. */
const factText = (value: object) =>
  Object.entries(value)
    .filter(([key, fact]) => key !== 'kind' && key !== 'name' && fact !== null && fact !== '')
    .map(([key, fact]) => `${key} ${typeof fact === 'object' ? JSON.stringify(fact) : fact}`)
    .join(', ');

const quantityFacts = ({ quantities, setOut }: NetReading): Facts => ({
  'Drops Nd': quantities.drops,
  'Channels Nf': quantities.channels,
  'Head lost': quantities.headLost,
  'Head per drop': quantities.headPerDrop,
  Seepage: quantities.seepage,
  'Length per pixel': setOut.unitsPerPx,
});

type Facts = Record<string, string | number | null>;

function changedFacts(before: Facts, after: Facts): ChangedFact[] {
  return [...new Set([...Object.keys(before), ...Object.keys(after)])]
    .map((label) => ({ label, before: before[label] ?? null, after: after[label] ?? null }))
    .filter((fact) => !isSame(fact.before, fact.after));
}

const isSame = (a: string | number | null, b: string | number | null) =>
  typeof a === 'number' && typeof b === 'number' ? isSameFigure(a, b) : a === b;

function comparedPoints(before: NetReading, after: NetReading): ComparedPoint[] {
  const were = new Map(before.points.map((point) => [point.id, point]));
  const are = new Map(after.points.map((point) => [point.id, point]));
  return idsOf(were, are).map((id) => {
    const [was, is] = [were.get(id), are.get(id)];
    const figure = (key: 'totalHead' | 'porePressure') => pairOf(figureOf(was, key), figureOf(is, key));
    return {
      id,
      name: (is ?? was)?.name ?? '',
      totalHead: figure('totalHead'),
      porePressure: figure('porePressure'),
    };
  });
}

const figureOf = (point: PointReading | undefined, key: 'totalHead' | 'porePressure') =>
  point === undefined || point.status === 'withheld' ? null : point[key];

const pairOf = (before: number | null, after: number | null): FigurePair => ({
  before,
  after,
  difference: before === null || after === null ? null : after - before,
});
