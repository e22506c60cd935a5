import { v7 as uuidv7 } from 'uuid';
import { DrawingEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import {
  type DocumentEntity,
  type EntityKind,
  type EntityOf,
  type FlowNetDocument,
  type SheetPoint,
  SINGLE_KINDS,
  singleOf,
} from '#shared/contract/document.ts';
import type { NetDetailDto, NetOp } from '#shared/contract/nets.ts';
import type { Caller } from './caller.ts';
import { exactNetDocument } from './exact-nets/exact-net-document.ts';
import { EXACT_NETS } from './exact-nets/exact-nets.ts';
import type { TestApp } from './test-app.ts';
import { addDam, addMember, type TestPerson } from './test-people.ts';

/** What a net is made with: the database and somebody signed in, of a test's own application or of a real server. */
type Makers = Pick<TestApp, 'db' | 'signIn'>;

/** A drawing with one rendered sheet, as if it had been uploaded. */
export async function addSheet(app: Pick<Makers, 'db'>, damId: string, uploadedBy: string): Promise<string> {
  const drawingId = uuidv7();
  const sheetId = uuidv7();
  await app.db.getRepository(DrawingEntity).insert({
    id: drawingId,
    damId,
    uploadedBy,
    sha256: 'a'.repeat(64),
    fileName: 'hf-114.tif',
    mediaType: 'image/tiff',
    byteSize: '1000',
    number: 'HF-114',
    title: 'Cross-sections',
    revision: 'C',
  });
  await app.db.getRepository(SheetEntity).insert({
    id: sheetId,
    drawingId,
    pageNumber: 1,
    widthPx: 2000,
    heightPx: 1000,
    dpi: 300,
    rendition: 'base',
    tileSizePx: 512,
    maxZoom: 2,
    tileFormat: 'png',
  });
  return sheetId;
}

export interface NetPlaceFixture {
  damId: string;
  sheetId: string;
  sectionId: string;
  netId: string;
  engineer: TestPerson;
  caller: Caller;
}

/** A dam with an engineer, a sheet, Section B–B and an empty net, made through the API. */
export async function addNet(app: Makers, engineerName = 'Iris Marsh'): Promise<NetPlaceFixture> {
  const { person: engineer, caller } = await app.signIn(engineerName);
  const damId = await addDam(app.db, engineer.id);
  await addMember(app.db, damId, engineer.id, 'engineer');
  const sheetId = await addSheet(app, damId, engineer.id);
  const sectionId = uuidv7();
  await caller
    .post(`/sheets/${sheetId}/sections`, { id: sectionId, name: 'B–B', chainage: '212', frame: null })
    .expect(201);
  const netId = uuidv7();
  await caller.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Full supply' }).expect(201);
  return { damId, sheetId, sectionId, netId, engineer, caller };
}

export async function openNet(caller: Caller, netId: string): Promise<NetDetailDto> {
  return (await caller.get(`/nets/${netId}`).expect(200)).body;
}

export const put = (value: DocumentEntity, entityId = uuidv7(), baseVersion = 0): NetOp => ({
  op: 'put',
  entityId,
  baseVersion,
  value,
});

/** A change of the one entity of its kind, on the version the document holds. */
export function putSingle<K extends EntityKind>(
  document: FlowNetDocument,
  kind: K,
  change: Partial<EntityOf<K>>,
): NetOp {
  const held = singleOf(document, kind);
  if (!held) throw new Error(`The document has no ${kind}.`);
  return put({ ...held.value, ...change } as DocumentEntity, held.id, held.version);
}

/** One browser's numbered batches. */
export function batchesOf(clientId = uuidv7()) {
  let seq = 0;
  return (ops: NetOp[], label = 'traced a line') => {
    seq += 1;
    return { clientId, seq, label, ops };
  };
}

export function lineOf(
  points: Array<[number, number]>,
  change: Partial<EntityOf<'line'>> = {},
): EntityOf<'line'> {
  return {
    kind: 'line',
    origin: 'traced',
    line: 'equipotential',
    name: '',
    points,
    finished: true,
    water: null,
    head: null,
    drops: null,
    ...change,
  };
}

/** Puts the entities of a document into an empty net, as somebody would who traced it. */
export async function fillNet(caller: Caller, netId: string, source: FlowNetDocument): Promise<void> {
  const { document } = await openNet(caller, netId);
  const ops = Object.values(source.entities).map(({ value }) =>
    SINGLE_KINDS.includes(value.kind) ? putSingle(document, value.kind, value) : put(value),
  );
  await caller.post(`/nets/${netId}/commands`, batchesOf()(ops, 'traced the net')).expect(200);
}

/** A finished net: the basic parabola on a turned sheet, with reading points in its middle channel. */
export function finishedDocument(readingCount = 3): FlowNetDocument {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const readings = Array.from({ length: readingCount }, (_, i) => ({
    at: net.placeAt(2.4 + 2 * i, 1.5),
    clicked: true,
  }));
  return exactNetDocument(net, { pxPerUnit, readings });
}

/** A finished net but for its base, which was scribbled over and over itself. */
export function tangledDocument(): FlowNetDocument {
  const document = finishedDocument();
  const points = Array.from({ length: 400 }, (_, i): SheetPoint => [(i * 2617) % 5000, (i * 1733) % 3500]);
  for (const { value } of Object.values(document.entities))
    if (value.kind === 'line' && value.line === 'impervious') value.points = points;
  return document;
}

/** A dam with a finished net. */
export async function addFinishedNet(app: Makers, engineerName?: string): Promise<NetPlaceFixture> {
  const place = await addNet(app, engineerName);
  await fillNet(place.caller, place.netId, finishedDocument());
  return place;
}
