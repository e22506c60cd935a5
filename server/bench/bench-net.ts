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

/** 60 lines in all: the two beds, the apron, 36 equipotentials and 21 flow lines. */
const NET = flatApronNet({
  width: 20,
  headwater: 108,
  tailwater: 100,
  drops: 37,
  channels: 21,
  middle: [0, 100],
});
const VERTICES = 100;
const READINGS = 24;
const PX_PER_M = 115;

const toSheet = ([offset, elevation]: ExactPlace): SheetPoint => [
  A1_PX.width / 2 + PX_PER_M * offset,
  1500 - PX_PER_M * (elevation - 100),
];

function knownPoints(): Array<EntityOf<'knownPoint'>> {
  const places: ExactPlace[] = [
    [-30, 100],
    [30, 100],
    [-30, 75],
  ];
  return places.map((place, index) => ({
    kind: 'knownPoint',
    name: `K${index + 1}`,
    at: toSheet(place),
    offset: place[0],
    elevation: place[1],
    use: 'fit',
  }));
}

const lines = (): Array<EntityOf<'line'>> =>
  NET.lines.map((line) => ({
    kind: 'line',
    origin: 'traced',
    line: line.line,
    name: '',
    points: Array.from({ length: VERTICES }, (_, index) => toSheet(line.at(index / (VERTICES - 1)))),
    finished: true,
    water: line.water,
    head: null,
    drops: null,
  }));

const readingPoints = (): Array<EntityOf<'readingPoint'>> =>
  Array.from({ length: READINGS }, (_, index) => ({
    kind: 'readingPoint',
    ...UNSAID.readingPoint,
    name: `P${index + 1}`,
    place: { on: 'sheet', at: toSheet(NET.placeAt(1.5 + (index * 34) / READINGS, 2.5 + (index % 12))) },
    order: index,
  }));

const singles = (): DocumentEntity[] => [
  {
    kind: 'waterLevels',
    ...UNSAID.waterLevels,
    headwater: NET.headwater,
    tailwater: NET.tailwater,
    gammaW: 9.81,
    source: '',
  },
  { kind: 'permeability', ...UNSAID.soil, k: 2e-6, unit: 'm/s', factor: null, source: '' },
  {
    kind: 'netCount',
    countedIn: null,
    drops: NET.drops,
    channels: null,
    cellRatio: 1,
    tracingAccuracyPx: 1.5,
    knownPointAccuracyPx: 1,
  },
];

/** A traced net of 60 lines on a sheet, made through the API as the desk makes it. */
export async function traceBenchNet(
  client: ApiClient,
  sheetId: string,
): Promise<{ netId: string; sectionId: string }> {
  const [sectionId, netId] = [uuidv7(), uuidv7()];
  await client.post(`/sheets/${sheetId}/sections`, { id: sectionId, name: 'A', chainage: '', frame: null });
  await client.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Bench' });
  const { document } = await client.get<NetDetailDto>(`/nets/${netId}`);
  const opOf = (value: DocumentEntity): NetOp => {
    const held = SINGLE_KINDS.includes(value.kind) ? singleOf(document, value.kind) : null;
    return { op: 'put', entityId: held?.id ?? uuidv7(), baseVersion: held?.version ?? 0, value };
  };
  const ops = [...knownPoints(), ...lines(), ...readingPoints(), ...singles()].map(opOf);
  await client.post(`/nets/${netId}/commands`, { clientId: uuidv7(), seq: 1, label: 'traced', ops });
  return { netId, sectionId };
}
