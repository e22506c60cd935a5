import sharp from 'sharp';
import { v7 as uuidv7 } from 'uuid';
import { createRenderProcess } from '#server/imaging/render-process.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import {
  type DocumentEntity,
  type EntityKind,
  type FlowNetDocument,
  SINGLE_KINDS,
  singleOf,
  type UnitSystem,
} from '#shared/contract/document.ts';
import type { NetOp } from '#shared/contract/nets.ts';
import { type NetReading, netReading } from '#shared/contract/reading.ts';
import type { Caller } from '#tests/support/caller.ts';
import type { TestApp } from '#tests/support/test-app.ts';
import { addMember } from '#tests/support/test-people.ts';

/** A blank sheet of the size on which the exact nets are drawn, as a scan of 300 dpi. */
const blankScan = (widthPx: number, heightPx: number) =>
  sharp({ create: { width: widthPx, height: heightPx, channels: 3, background: '#efe9d8' } })
    .withMetadata({ density: 300 })
    .jpeg()
    .toBuffer();

/** A dam in the given units with one uploaded and rendered sheet; gives the sheet's id. */
async function sheetOnNewDam(
  app: TestApp,
  engineer: { person: { id: string }; caller: Caller },
  unitSystem: UnitSystem,
  gammaW: number,
  { widthPx, heightPx }: FlowNetDocument['sheet'],
): Promise<string> {
  const admin = await app.signIn('Ada Quist', { admin: true });
  const dam = { name: 'Exact', unitSystem, datum: 'LD', fullSupplyLevel: null, gammaW };
  const { body } = await admin.caller.post('/dams', dam).expect(201);
  await addMember(app.db, body.id, engineer.person.id, 'engineer');
  const scan = await blankScan(widthPx, heightPx);
  const uploaded = await engineer.caller
    .post(`/dams/${body.id}/drawings`)
    .attach('file', scan, 'blank.jpg')
    .expect(201);
  const job = app.jobs.queued.findLast(({ name }) => name === 'render-drawing');
  const render = createRenderDrawingHandler(app.deps, () => createRenderProcess());
  await render(job?.rowId ?? '', new AbortController().signal);
  const drawing = await engineer.caller.get(`/drawings/${uploaded.body.id}`).expect(200);
  expectSheet(drawing.body.sheets[0], widthPx, heightPx);
  return drawing.body.sheets[0].id;
}

function expectSheet(
  sheet: { widthPx: number; heightPx: number } | undefined,
  width: number,
  height: number,
) {
  if (sheet?.widthPx !== width || sheet.heightPx !== height)
    throw new Error(`The blank scan became ${sheet?.widthPx} × ${sheet?.heightPx} px.`);
}

const isSingle = (kind: EntityKind) => SINGLE_KINDS.includes(kind);

/** The operations by which the desk would make a fresh net into `drawn`. */
function opsFor(fresh: FlowNetDocument, drawn: FlowNetDocument): NetOp[] {
  return Object.values(drawn.entities).map(({ value }) => {
    const held = isSingle(value.kind) ? singleOf(fresh, value.kind) : null;
    return { op: 'put', entityId: held?.id ?? uuidv7(), baseVersion: held?.version ?? 0, value };
  });
}

/**
 * Draws a document through the product as a person would: a dam, an upload, rendering, a section, a net, commands;
 * and gives the schedule that the API answers.
 */
export async function scheduleThroughApi(app: TestApp, drawn: FlowNetDocument): Promise<NetReading> {
  const engineer = await app.signIn('Nora Fell');
  const { gammaW } = singleOf(drawn, 'waterLevels')?.value ?? { gammaW: 9.81 };
  const sheetId = await sheetOnNewDam(app, engineer, drawn.unitSystem, gammaW, drawn.sheet);
  const sectionId = uuidv7();
  const section = { id: sectionId, name: 'Exact', chainage: '0', frame: null };
  await engineer.caller.post(`/sheets/${sheetId}/sections`, section).expect(201);
  const netId = uuidv7();
  await engineer.caller.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Exact' }).expect(201);
  const { body: detail } = await engineer.caller.get(`/nets/${netId}`).expect(200);
  const ops = opsFor(detail.document, drawn);
  // Two batches, as a person saves now and then: first the section, then its net.
  const isSection = (op: NetOp) => op.op === 'put' && isSectionEntity(op.value);
  const batches = [ops.filter(isSection), ops.filter((op) => !isSection(op))];
  const clientId = uuidv7();
  for (const [index, batch] of batches.entries())
    await engineer.caller
      .post(`/nets/${netId}/commands`, { clientId, seq: index + 1, label: 'traced', ops: batch })
      .expect(200);
  const { body } = await engineer.caller.get(`/nets/${netId}/schedule`).expect(200);
  return netReading.parse(body);
}

const isSectionEntity = ({ kind }: DocumentEntity) => kind === 'knownPoint' || kind === 'setOut';
