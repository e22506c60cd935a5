import { v7 as uuidv7 } from 'uuid';
import type { ExactPlace } from '#shared/compute/exact/exact-net.ts';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import {
  type DocumentEntity,
  type EntityOf,
  type SheetPoint,
  SINGLE_KINDS,
  singleOf,
  UNSAID,
} from '#shared/contract/document.ts';
import type { NetDetailDto, NetOp } from '#shared/contract/nets.ts';
import { A1_PX } from './a1-sheet.ts';
import type { ApiClient } from './api-client.ts';
import { E_600 } from './line-work.ts';

/** A net under an apron, of which the lines are the two beds, the apron, the equipotentials and the flow lines. */
export type BenchNet = {
  readonly drops: number;
  readonly channels: number;
  readonly verticesPerLine: number;
  readonly readings: number;
  readonly pxPerM: number;
  readonly middlePx: SheetPoint;
};

/** 60 lines of 100 points on an A1 sheet at 300 dpi. */
export const A1_NET: BenchNet = {
  drops: 37,
  channels: 21,
  verticesPerLine: 100,
  readings: 24,
  pxPerM: 115,
  middlePx: [A1_PX.width / 2, 1500],
};
/** 200 lines and 5,000 points on an E-size sheet at 600 dpi. */
export const E600_NET: BenchNet = {
  drops: 121,
  channels: 77,
  verticesPerLine: 25,
  readings: 30,
  pxPerM: 320,
  middlePx: [E_600.width / 2, 4000],
};

const exactNet = ({ drops, channels }: BenchNet) =>
  flatApronNet({ width: 20, headwater: 108, tailwater: 100, drops, channels, middle: [0, 100] });

/** Place on the sheet by drops lost and channels counted from the apron. */
export function placeOnSheet(net: BenchNet, dropsLost: number, channel: number): SheetPoint {
  return toSheet(net, exactNet(net).placeAt(dropsLost, channel));
}

/** The place of a vertex of an equipotential, by its number from upstream and from the apron. */
export function vertexOnSheet(net: BenchNet, equipotential: number, vertex: number): SheetPoint {
  return placeOnSheet(net, equipotential, (net.channels * vertex) / (net.verticesPerLine - 1));
}

const toSheet = ({ middlePx, pxPerM }: BenchNet, [offset, elevation]: ExactPlace): SheetPoint => [
  middlePx[0] + pxPerM * offset,
  middlePx[1] - pxPerM * (elevation - 100),
];

function knownPoints(net: BenchNet): Array<EntityOf<'knownPoint'>> {
  const places: ExactPlace[] = [
    [-30, 100],
    [30, 100],
    [-30, 75],
  ];
  return places.map((place, index) => ({
    kind: 'knownPoint',
    name: `K${index + 1}`,
    at: toSheet(net, place),
    offset: place[0],
    elevation: place[1],
    use: 'fit',
  }));
}

const lines = (net: BenchNet): Array<EntityOf<'line'>> =>
  exactNet(net).lines.map((line) => ({
    kind: 'line',
    origin: 'traced',
    line: line.line,
    name: '',
    points: Array.from({ length: net.verticesPerLine }, (_, index) =>
      toSheet(net, line.at(index / (net.verticesPerLine - 1))),
    ),
    finished: true,
    water: line.water,
    head: null,
    drops: null,
  }));

const readingPoints = (net: BenchNet): Array<EntityOf<'readingPoint'>> =>
  Array.from({ length: net.readings }, (_, index) => ({
    kind: 'readingPoint',
    ...UNSAID.readingPoint,
    name: `P${index + 1}`,
    place: {
      on: 'sheet',
      at: placeOnSheet(net, 1.5 + (index * (net.drops - 3)) / net.readings, 2.5 + (index % 12)),
    },
    order: index,
  }));

const singles = ({ drops }: BenchNet): DocumentEntity[] => [
  {
    kind: 'waterLevels',
    ...UNSAID.waterLevels,
    headwater: 108,
    tailwater: 100,
    gammaW: 9.81,
    source: '',
  },
  { kind: 'permeability', ...UNSAID.soil, k: 2e-6, unit: 'm/s', factor: null, source: '' },
  {
    kind: 'netCount',
    countedIn: null,
    drops,
    channels: null,
    cellRatio: 1,
    tracingAccuracyPx: 1.5,
    knownPointAccuracyPx: 1,
  },
];

/** A traced net on a sheet, made through the API as the desk makes it. */
export async function traceBenchNet(
  client: ApiClient,
  sheetId: string,
  net: BenchNet = A1_NET,
): Promise<{ netId: string; sectionId: string }> {
  const [sectionId, netId] = [uuidv7(), uuidv7()];
  await client.post(`/sheets/${sheetId}/sections`, { id: sectionId, name: 'A', chainage: '', frame: null });
  await client.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Bench' });
  const { document } = await client.get<NetDetailDto>(`/nets/${netId}`);
  const opOf = (value: DocumentEntity): NetOp => {
    const held = SINGLE_KINDS.includes(value.kind) ? singleOf(document, value.kind) : null;
    return { op: 'put', entityId: held?.id ?? uuidv7(), baseVersion: held?.version ?? 0, value };
  };
  const ops = [...knownPoints(net), ...lines(net), ...readingPoints(net), ...singles(net)].map(opOf);
  await client.post(`/nets/${netId}/commands`, { clientId: uuidv7(), seq: 1, label: 'traced', ops });
  return { netId, sectionId };
}
