import sharp from 'sharp';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import { MAX_OPS_PER_BATCH } from '#shared/contract/limits.ts';
import type { Caller } from '#tests/support/caller.ts';
import { FIRST_DOCUMENT_TEXT } from '#tests/support/first-version/first-version.ts';
import {
  addFinishedNet,
  addNet,
  batchesOf,
  finishedDocument,
  lineOf,
  openNet,
  put,
} from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const inputOf = (text: string, accepted: string[] = []) => ({
  id: uuidv7(),
  name: 'From a file',
  text,
  accepted,
});
const downloaded = async (caller: Caller, netId: string) =>
  (await caller.get(`/nets/${netId}/document`).expect(200)).text;
/** The document with one thing of its frame changed. */
const changed = (text: string, change: Partial<FlowNetDocument>) =>
  JSON.stringify({ ...JSON.parse(text), ...change });
/** Values without ids and versions, in the order in which they are read. */
const valuesOf = (document: FlowNetDocument) =>
  Object.values(document.entities)
    .sort((a, b) => (a.id < b.id ? -1 : 1))
    .map(({ value }) => value)
    .sort((a, b) => (a.kind < b.kind ? -1 : a.kind > b.kind ? 1 : 0));
/** A section of the same sheet without known points. */
async function newSection(caller: Caller, sheetId: string) {
  const section = { id: uuidv7(), name: 'C–C', chainage: '', frame: null };
  await caller.post(`/sheets/${sheetId}/sections`, section).expect(201);
  return section.id;
}
const netsOf = async (sectionId: string) =>
  (await app.db.query('SELECT id FROM net WHERE section_id = $1', [sectionId])).length;

describe('a file that cannot be put there', () => {
  it('is refused with the line and field of each fault, and no net is made', async () => {
    const { caller, sectionId } = await addNet(app);
    const text = JSON.stringify(finishedDocument(), null, 2).replace(/"gammaW": [\d.]+/, '"gammaW": "heavy"');
    const line = text.split('\n').findIndex((row) => row.includes('"heavy"')) + 1;
    const { body } = await caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(400);
    expect(body.code).toBe('invalid-input');
    expect(body.errors).toHaveLength(1);
    expect(body.errors[0].message).toMatch(new RegExp(`^Line ${line}, entities\\..*\\.value\\.gammaW: `));
    expect(await netsOf(sectionId)).toBe(1);
  });

  it('with faults without end has the first of them told, and how many there are more', async () => {
    const { caller, sectionId } = await addNet(app);
    const text = JSON.stringify(finishedDocument()).replaceAll('"version":1', '"version":0');
    const { body } = await caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(400);
    expect(body.errors.length).toBe(21);
    expect(body.errors[20].message).toMatch(/^There are \d+ more faults\.$/);
  });

  it('is refused in the other unit system, on a sheet of another size, and under an id that is taken', async () => {
    const { caller, netId, sectionId, sheetId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const other = await newSection(caller, sheetId);
    const send = (content: string, change = {}) =>
      caller.post(`/sections/${other}/net-files`, { ...inputOf(content), ...change });
    const feet = await send(changed(text, { unitSystem: 'US' })).expect(400);
    expect(feet.body.errors).toMatchObject([{ path: 'unitSystem' }]);
    const size = await send(changed(text, { sheet: { widthPx: 10, heightPx: 10, dpi: null } })).expect(400);
    expect(size.body.errors[0].message).toMatch(/on a sheet of 10 × 10 px/);
    expect((await send(text, { id: netId }).expect(409)).body.code).toBe('already-exists');
    expect([await netsOf(other), await netsOf(sectionId)]).toEqual([0, 1]);
  });

  it('is refused while the section is put away', async () => {
    const { caller, netId, sectionId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    await caller.post(`/sections/${sectionId}/archive`).expect(200);
    await caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(409);
  });

  it('cannot be put there by a reviewer, and there is no section for a stranger', async () => {
    const { caller, netId, sectionId, damId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const reviewer = await app.signIn('Remi Okafor');
    await addMember(app.db, damId, reviewer.person.id, 'reviewer');
    await reviewer.caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(403);
    const stranger = await app.signIn('Nils Brandt');
    await stranger.caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(404);
    const onBlank = { ...inputOf(text), sectionName: 'A–A' };
    await stranger.caller.post(`/dams/${damId}/net-files`, onBlank).expect(404);
  });
});

describe('a file put on the section it came from', () => {
  it('makes a net of the same lines under ids of their own, with the same figures', async () => {
    const { caller, netId, sectionId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const input = inputOf(text);
    const { body } = await caller.post(`/sections/${sectionId}/net-files`, input).expect(201);
    expect(body).toMatchObject({ net: { id: input.id, name: 'From a file', drops: 10 }, told: [] });
    const [was, is] = [await openNet(caller, netId), await openNet(caller, input.id)];
    expect(valuesOf(is.document)).toEqual(valuesOf(was.document));
    const shared = Object.keys(is.document.entities).filter((id) => id in was.document.entities);
    expect(shared.map((id) => is.document.entities[id]!.value.kind).sort()).toEqual(
      [...entitiesOf(was.document, 'knownPoint'), null]
        .map((point) => (point ? 'knownPoint' : 'setOut'))
        .sort(),
    );
    const pressures = (document: FlowNetDocument) =>
      readNet(document).points.map((point) => point.porePressure);
    expect(pressures(is.document)).toEqual(pressures(was.document));
  });

  it('is drawn by whoever put it there', async () => {
    const { caller, netId, sectionId, damId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const other = await app.signIn('Jon Tracer');
    await addMember(app.db, damId, other.person.id, 'engineer');
    const input = inputOf(text);
    await other.caller.post(`/sections/${sectionId}/net-files`, input).expect(201);
    expect((await openNet(caller, input.id)).drawnBy.map(({ id }) => id)).toContain(other.person.id);
    const events: Array<{ type: string }> = await app.db.query(
      'SELECT type FROM event WHERE net_id = $1 ORDER BY id',
      [input.id],
    );
    expect(events.map(({ type }) => type)).toEqual(['net.created', 'net.changed']);
  });

  it('asks before the known points of the file are left out, and keeps those of the section', async () => {
    const { caller, netId, sectionId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const { document } = await openNet(caller, netId);
    const point = entitiesOf(document, 'knownPoint')[0]!;
    const moved = { ...point.value, elevation: (point.value.elevation ?? 0) + 1 };
    await caller
      .post(`/nets/${netId}/commands`, batchesOf()([put(moved, point.id, point.version)]))
      .expect(200);
    const asked = await caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(409);
    expect(asked.body.extra.questions).toMatchObject([{ code: 'setOut' }]);
    expect(await netsOf(sectionId)).toBe(1);
    const input = inputOf(text, ['setOut']);
    const { body } = await caller.post(`/sections/${sectionId}/net-files`, input).expect(201);
    expect(body.told).toEqual([asked.body.extra.questions[0].text]);
    const after = await openNet(caller, input.id);
    expect(entitiesOf(after.document, 'knownPoint').map(({ value }) => value.elevation)).toContain(
      moved.elevation,
    );
  });

  it('asks before elevations above another datum are taken as they stand', async () => {
    const { caller, netId, sectionId } = await addFinishedNet(app);
    const text = changed(await downloaded(caller, netId), { datum: 'Fen Gauge 1931' });
    const asked = await caller.post(`/sections/${sectionId}/net-files`, inputOf(text)).expect(409);
    expect(asked.body.extra.questions).toMatchObject([{ code: 'datum' }]);
    expect(asked.body.extra.questions[0].text).toContain('"Fen Gauge 1931"');
    await caller.post(`/sections/${sectionId}/net-files`, inputOf(text, ['datum'])).expect(201);
  });
});

describe('a file put on a section without known points', () => {
  it('sets the section out, gives all its nets that number, and keeps the ids', async () => {
    const { caller, netId, sheetId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const other = await newSection(caller, sheetId);
    const emptyId = uuidv7();
    await caller.post(`/sections/${other}/nets`, { id: emptyId, name: 'Flood' }).expect(201);
    const input = inputOf(text);
    await caller.post(`/sections/${other}/net-files`, input).expect(201);
    const [empty, filled] = [await openNet(caller, emptyId), await openNet(caller, input.id)];
    expect(filled.section.calibrated).toBe(true);
    expect(entitiesOf(empty.document, 'knownPoint')).toEqual(entitiesOf(filled.document, 'knownPoint'));
    expect(empty.changeNumber).toBe(filled.changeNumber);
    const source = (JSON.parse(text) as FlowNetDocument).entities;
    for (const { id } of entitiesOf(filled.document, 'line')) expect(source).toHaveProperty(id);
  });

  it('may be of the first version of the document', async () => {
    const { caller, sheetId } = await addNet(app);
    const other = await newSection(caller, sheetId);
    const { sheet, datum } = (await openOf(caller, sheetId)) ?? {};
    const input = inputOf(changed(FIRST_DOCUMENT_TEXT, { sheet: sheet!, datum: datum! }));
    await caller.post(`/sections/${other}/net-files`, input).expect(201);
    const { document } = await openNet(caller, input.id);
    expect(entitiesOf(document, 'line').every(({ value }) => value.origin === 'traced')).toBe(true);
  });

  it('may hold more entities than one batch of commands', async () => {
    const { caller, sheetId, netId } = await addFinishedNet(app);
    const document = JSON.parse(await downloaded(caller, netId)) as FlowNetDocument;
    const note = lineOf([[5, 5]], { finished: false });
    for (let i = 0; i < MAX_OPS_PER_BATCH; i += 1) {
      const id = uuidv7();
      document.entities[id] = { id, version: 1, value: note };
    }
    const input = inputOf(JSON.stringify(document));
    await caller.post(`/sections/${await newSection(caller, sheetId)}/net-files`, input).expect(201);
    const made = await openNet(caller, input.id);
    expect(Object.keys(made.document.entities)).toHaveLength(Object.keys(document.entities).length);
  });
});

describe('a file put on an empty sheet', () => {
  const onBlank = (text: string, accepted: string[] = []) => ({
    ...inputOf(text, accepted),
    sectionName: 'A–A',
  });

  it('is refused for a size that no sheet has', async () => {
    const { caller, netId, damId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    for (const sheet of [
      { widthPx: 100.5, heightPx: 100, dpi: null },
      { widthPx: 200_000, heightPx: 10, dpi: null },
      { widthPx: 50_000, heightPx: 50_000, dpi: null },
    ]) {
      const { body } = await caller
        .post(`/dams/${damId}/net-files`, onBlank(changed(text, { sheet })))
        .expect(400);
      expect(body.errors).toMatchObject([{ path: 'sheet' }]);
    }
  });

  it('makes a drawing of a white sheet of that size, to scale, with the same figures', async () => {
    const { caller, netId, damId } = await addFinishedNet(app);
    const text = await downloaded(caller, netId);
    const input = onBlank(text);
    const { body } = await caller.post(`/dams/${damId}/net-files`, input).expect(201);
    expect(body).toMatchObject({ net: { id: input.id, drops: 10 }, told: [] });
    const [was, made] = [await openNet(caller, netId), await openNet(caller, input.id)];
    expect(made.section).toMatchObject({ name: 'A–A', calibrated: true, frame: null });
    expect(made.document.sheet).toEqual(was.document.sheet);
    expect(readNet(made.document).points.map((point) => point.porePressure)).toEqual(
      readNet(was.document).points.map((point) => point.porePressure),
    );
    const { tiles, id } = made.sheet;
    const tile = await caller.get(`/sheets/${id}/tiles/${tiles.rendition}/0/0_0`).expect(200);
    const { channels } = await sharp(tile.body).stats();
    expect(channels.map(({ min, max }) => [min, max])).toEqual([[255, 255]]);
    const original = await caller.get(`/drawings/${made.drawing.id}/original`).expect(200);
    const { width, height } = await sharp(original.body).metadata();
    expect({ width, height }).toEqual({ width: made.sheet.widthPx, height: made.sheet.heightPx });
  });

  it('asks about the datum before anything is made', async () => {
    const { caller, netId, damId } = await addFinishedNet(app);
    const drawings = async () => (await caller.get(`/dams/${damId}/drawings`).expect(200)).body.items.length;
    const text = changed(await downloaded(caller, netId), { datum: '' });
    const before = await drawings();
    const asked = await caller.post(`/dams/${damId}/net-files`, onBlank(text)).expect(409);
    expect(asked.body.extra.questions).toMatchObject([{ code: 'datum' }]);
    expect(await drawings()).toBe(before);
  });
});

/** Sheet and datum as a document of a section of this sheet has them. */
async function openOf(caller: Caller, sheetId: string) {
  const section = await newSection(caller, sheetId);
  const netId = uuidv7();
  await caller.post(`/sections/${section}/nets`, { id: netId, name: 'Any' }).expect(201);
  return (await openNet(caller, netId)).document;
}
