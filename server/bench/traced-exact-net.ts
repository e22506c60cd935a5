import type { ExactNet, ExactPlace } from '#shared/compute/exact/exact-net.ts';
import {
  type DocumentEntity,
  type EntityOf,
  type FlowNetDocument,
  type SheetPoint,
  UNSAID,
} from '#shared/contract/document.ts';

/** How an exact net is drawn and traced by a trembling hand. */
export type TracedNet = {
  readonly net: ExactNet;
  readonly pxPerUnit: number;
  readonly jitterPx: number;
  readonly seed: number;
  readonly places: readonly ExactPlace[];
};

const SHEET = { widthPx: 5000, heightPx: 3500, dpi: 300 };
const TURN = (1.1 * Math.PI) / 180;
const SPACING_PX = 14;

/** Evenly spread numbers from 0 to 1 that a seed repeats (mulberry32, Tommy Ettinger, public domain). */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** Random places inside an exact net, spread evenly over its area, so that none is favoured for lying in a large cell. */
export function placesOver(net: ExactNet, count: number, seed: number): ExactPlace[] {
  const random = seededRandom(seed);
  const draw = (): [number, number] => [
    0.01 + random() * (net.drops - 0.02),
    0.01 + random() * (net.channels - 0.02),
  ];
  const most = Math.max(...Array.from({ length: 2000 }, () => areaAt(net, ...draw())));
  const places: ExactPlace[] = [];
  while (places.length < count) {
    const place = draw();
    if (random() * most < areaAt(net, ...place)) places.push(net.placeAt(...place));
  }
  return places;
}

function areaAt(net: ExactNet, drops: number, channel: number): number {
  const step = 1e-3;
  const [x, y] = net.placeAt(drops, channel);
  const [dx, dy] = net.placeAt(drops + step, channel);
  const [cx, cy] = net.placeAt(drops, channel + step);
  return Math.abs((dx - x) * (cy - y) - (dy - y) * (cx - x));
}

/** The finished document of an exact net on a sheet of 5,000 px that is turned by about a degree. */
export function tracedDocument({ net, pxPerUnit, jitterPx, seed, places }: TracedNet): FlowNetDocument {
  const random = seededRandom(seed);
  const noise = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  const [midOffset, midElevation] = middleOf(net);
  const toSheet = ([offset, elevation]: ExactPlace): SheetPoint => {
    const [dx, dz] = [pxPerUnit * (offset - midOffset), pxPerUnit * (elevation - midElevation)];
    return [
      SHEET.widthPx / 2 + dx * Math.cos(TURN) + dz * Math.sin(TURN),
      SHEET.heightPx / 2 + dx * Math.sin(TURN) - dz * Math.cos(TURN),
    ];
  };
  const trembled = ([x, y]: SheetPoint): SheetPoint => [x + jitterPx * noise(), y + jitterPx * noise()];
  const values: DocumentEntity[] = [
    ...knownPoints(midOffset, midElevation, toSheet),
    ...net.lines.map(
      (line): EntityOf<'line'> => ({
        kind: 'line',
        origin: 'traced',
        line: line.line,
        name: '',
        points: spaced(line.at, SPACING_PX / pxPerUnit)
          .map(toSheet)
          .map(trembled),
        finished: true,
        water: line.water,
        head: null,
        drops: null,
      }),
    ),
    ...singlesOf(net),
    ...places.map(
      (place, i): EntityOf<'readingPoint'> => ({
        kind: 'readingPoint',
        ...UNSAID.readingPoint,
        name: `P${i + 1}`,
        place: { on: 'section', offset: place[0], elevation: place[1] },
        order: i,
      }),
    ),
  ];
  const entities = values.map((value, i) => ({ id: idOf(i + 1), version: 1, value }));
  return {
    format: 'tracehead/flow-net',
    version: 3,
    id: idOf(0xfff0),
    name: 'Bench net',
    unitSystem: 'SI',
    datum: 'LD',
    sheet: SHEET,
    entities: Object.fromEntries(entities.map((entity) => [entity.id, entity])),
  };
}

function idOf(n: number): string {
  return `01930000-0000-7000-8000-${n.toString(16).padStart(12, '0')}`;
}

function middleOf(net: ExactNet): ExactPlace {
  const places = net.lines.flatMap((line) => [0, 0.5, 1].map((part) => line.at(part)));
  const middle = (values: number[]) => (Math.min(...values) + Math.max(...values)) / 2;
  return [middle(places.map(([offset]) => offset)), middle(places.map(([, elevation]) => elevation))];
}

function knownPoints(
  offset: number,
  elevation: number,
  toSheet: (place: ExactPlace) => SheetPoint,
): Array<EntityOf<'knownPoint'>> {
  const corners: ExactPlace[] = [
    [offset - 20, elevation - 10],
    [offset + 20, elevation - 10],
    [offset - 20, elevation + 10],
  ];
  return corners.map((corner, i) => ({
    kind: 'knownPoint',
    name: `K${i + 1}`,
    at: toSheet(corner),
    offset: corner[0],
    elevation: corner[1],
    use: 'fit',
  }));
}

function singlesOf(net: ExactNet): DocumentEntity[] {
  return [
    {
      kind: 'setOut',
      scales: 'equal',
      method: 'points',
      distance: null,
      level: 'line',
      offsetsGrow: null,
      upstream: 'left',
      upQuarterTurns: null,
      statedScale: null,
    },
    {
      kind: 'waterLevels',
      ...UNSAID.waterLevels,
      headwater: net.headwater,
      tailwater: net.tailwater,
      gammaW: 9.81,
      source: '',
    },
    { kind: 'permeability', ...UNSAID.soil, k: 2e-6, unit: 'm/s', factor: null, source: '' },
    {
      kind: 'netCount',
      countedIn: null,
      drops: net.drops,
      channels: null,
      cellRatio: 1,
      tracingAccuracyPx: 1.5,
      knownPointAccuracyPx: 1,
    },
  ];
}

/** Places about evenly spaced along a smooth line, ends included. */
function spaced(at: (part: number) => ExactPlace, spacing: number): ExactPlace[] {
  const fine = Array.from({ length: 1501 }, (_, i) => at(i / 1500));
  const kept = [fine[0]!];
  let along = 0;
  for (let i = 1; i < fine.length; i += 1) {
    along += Math.hypot(fine[i]![0] - fine[i - 1]![0], fine[i]![1] - fine[i - 1]![1]);
    if (along < spacing && i < fine.length - 1) continue;
    kept.push(fine[i]!);
    along = 0;
  }
  return kept;
}
