import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type EntityKind, entitiesOf, singleOf } from '#shared/contract/document.ts';
import {
  addFinishedNet,
  addNet,
  addSheet,
  batchesOf,
  lineOf,
  openNet,
  put,
} from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const kindsIn = (document: Parameters<typeof entitiesOf>[0]): EntityKind[] =>
  Object.values(document.entities)
    .map((entity) => entity.value.kind)
    .sort();

describe('a section', () => {
  it('refuses a frame off the sheet or without size', async () => {
    const { caller, sheetId } = await addNet(app);
    for (const frame of [
      [2100, 10, 50, 50],
      [10, 10, 0, 50],
      [-80, 10, 60, 50],
    ]) {
      const input = { id: uuidv7(), name: 'C–C', chainage: '', frame };
      const { body } = await caller.post(`/sheets/${sheetId}/sections`, input).expect(400);
      expect(body.errors[0].path).toBe('frame');
    }
  });

  it('refuses an id that is taken', async () => {
    const { caller, sheetId, sectionId } = await addNet(app);
    const input = { id: sectionId, name: 'C–C', chainage: '', frame: null };
    const { body } = await caller.post(`/sheets/${sheetId}/sections`, input).expect(409);
    expect(body.code).toBe('already-exists');
  });

  it('is not calibrated before known points are marked', async () => {
    const { caller, netId } = await addNet(app);
    const { section } = await openNet(caller, netId);
    expect(section).toMatchObject({ name: 'B–B', chainage: '212', calibrated: false, archivedAt: null });
  });

  it('takes a new name and frame and keeps its nets', async () => {
    const { caller, sectionId, netId } = await addNet(app);
    const { body } = await caller
      .patch(`/sections/${sectionId}`, { name: 'D–D', frame: [10, 20, 300, 200] })
      .expect(200);
    expect(body).toMatchObject({ name: 'D–D', chainage: '212', frame: [10, 20, 300, 200] });
    expect(body.nets.map((net: { id: string }) => net.id)).toEqual([netId]);
  });

  it('refuses changes while it is put away and takes them when brought back', async () => {
    const { caller, sectionId } = await addNet(app);
    const away = await caller.post(`/sections/${sectionId}/archive`).expect(200);
    expect(away.body.archivedAt).not.toBeNull();
    const refused = await caller.patch(`/sections/${sectionId}`, { name: 'E–E' }).expect(409);
    expect(refused.body.detail).toMatch(/section has been put away/);
    await caller.post(`/sections/${sectionId}/nets`, { id: uuidv7(), name: 'Flood' }).expect(409);
    const back = await caller.post(`/sections/${sectionId}/restore`).expect(200);
    expect(back.body.archivedAt).toBeNull();
    await caller.patch(`/sections/${sectionId}`, { name: 'E–E' }).expect(200);
  });

  it('cannot be made by a reviewer, and is not there for a stranger', async () => {
    const { damId, sheetId } = await addNet(app);
    const input = { id: uuidv7(), name: 'F–F', chainage: '', frame: null };
    const reviewer = await app.signIn('Remi Okafor');
    await addMember(app.db, damId, reviewer.person.id, 'reviewer');
    await reviewer.caller.post(`/sheets/${sheetId}/sections`, input).expect(403);
    const stranger = await app.signIn('Nils Brandt');
    await stranger.caller.post(`/sheets/${sheetId}/sections`, input).expect(404);
  });
});

describe('a net', () => {
  it('starts with the set-out of its section and its own levels, permeability and count', async () => {
    const { caller, netId, engineer, damId } = await addNet(app);
    const detail = await openNet(caller, netId);
    expect(kindsIn(detail.document)).toEqual(['netCount', 'permeability', 'setOut', 'waterLevels']);
    expect(singleOf(detail.document, 'waterLevels')?.value).toMatchObject({ headwater: null, gammaW: 9.81 });
    expect(detail.net).toMatchObject({ name: 'Full supply', state: 'draft', openNotes: 0, drops: null });
    expect(detail.dam).toMatchObject({ id: damId, fullSupplyLevel: 118 });
    expect(detail).toMatchObject({ changeNumber: 0, revisionCount: 0 });
    expect(detail.drawnBy).toEqual([{ id: engineer.id, name: engineer.name }]);
    expect(detail.can).toContain('net.send');
  });

  it('has its drops in lists only while its lines bear out the count that is stated', async () => {
    const { caller, netId, damId } = await addFinishedNet(app);
    const listed = async () => {
      const { body } = await caller.get(`/dams/${damId}/drawings`).expect(200);
      return body.items[0].sections[0].nets[0].drops;
    };
    expect(await listed()).toBe(10);
    const { document, net } = await openNet(caller, netId);
    expect(net.drops).toBe(10);
    const drain = entitiesOf(document, 'line').find(({ value }) => value.line === 'drain')!;
    const send = batchesOf();
    const removed = send([{ op: 'remove', entityId: drain.id, baseVersion: drain.version }]);
    await caller.post(`/nets/${netId}/commands`, removed).expect(200);
    expect(await listed()).toBeNull();
    const after = await openNet(caller, netId);
    expect(singleOf(after.document, 'netCount')?.value.drops).toBe(10);
    expect(after.net.drops).toBeNull();
    await caller.post(`/nets/${netId}/commands`, send([put(drain.value)])).expect(200);
    expect(await listed()).toBe(10);
  });

  it("is in the dam's own units with its unit weight of water", async () => {
    const { person, caller } = await app.signIn('Iris Marsh');
    const damId = await addDam(app.db, person.id, { unitSystem: 'US' });
    await addMember(app.db, damId, person.id, 'engineer');
    const sheetId = await addSheet(app, damId, person.id);
    const sectionId = uuidv7();
    const netId = uuidv7();
    await caller
      .post(`/sheets/${sheetId}/sections`, { id: sectionId, name: 'A–A', chainage: '', frame: null })
      .expect(201);
    await caller.post(`/sections/${sectionId}/nets`, { id: netId, name: 'Flood' }).expect(201);
    const { document } = await openNet(caller, netId);
    expect(document.unitSystem).toBe('US');
    expect(singleOf(document, 'waterLevels')?.value.gammaW).toBe(62.4);
    expect(singleOf(document, 'permeability')?.value.unit).toBe('ft/day');
  });

  it('is renamed, put away and brought back, and each is told in the activity', async () => {
    const { caller, netId } = await addNet(app);
    const renamed = await caller.patch(`/nets/${netId}`, { name: 'Flood level' }).expect(200);
    expect(renamed.body.name).toBe('Flood level');
    expect((await caller.post(`/nets/${netId}/archive`).expect(200)).body.archivedAt).not.toBeNull();
    await caller.patch(`/nets/${netId}`, { name: 'Other' }).expect(409);
    expect((await caller.post(`/nets/${netId}/restore`).expect(200)).body.archivedAt).toBeNull();
    const events: Array<{ type: string }> = await app.db.query(
      'SELECT type FROM event WHERE net_id = $1 ORDER BY id',
      [netId],
    );
    expect(events.map((event) => event.type)).toEqual([
      'net.created',
      'net.renamed',
      'net.archived',
      'net.restored',
    ]);
  });

  it('that is put away twice is put away once', async () => {
    const { caller, netId } = await addNet(app);
    const first = await caller.post(`/nets/${netId}/archive`).expect(200);
    const second = await caller.post(`/nets/${netId}/archive`).expect(200);
    expect(second.body.archivedAt).toBe(first.body.archivedAt);
  });

  it('allows nobody to trace while it, its section, its drawing or its dam is put away', async () => {
    const { caller, netId, sectionId, damId, sheetId } = await addNet(app);
    const mayTrace = async () => (await openNet(caller, netId)).can.includes('net.trace');
    const drawing = '(SELECT drawing_id FROM sheet WHERE id = $2)';
    expect(await mayTrace()).toBe(true);
    for (const [table, id] of [
      ['net', netId],
      ['section', sectionId],
      ['dam', damId],
    ]) {
      await app.db.query(`UPDATE ${table} SET archived_at = now() WHERE id = $1`, [id]);
      expect(await mayTrace(), table).toBe(false);
      await app.db.query(`UPDATE ${table} SET archived_at = NULL WHERE id = $1`, [id]);
    }
    await app.db.query(`UPDATE drawing SET archived_at = $1 WHERE id = ${drawing}`, [new Date(), sheetId]);
    expect(await mayTrace()).toBe(false);
    expect((await openNet(caller, netId)).can).toContain('net.archive');
  });

  it('is drawn by whoever set its section out, through whichever of its nets', async () => {
    const { caller, netId, sectionId, damId, engineer } = await addNet(app);
    const surveyor = await app.signIn('Sana Verma');
    await addMember(app.db, damId, surveyor.person.id, 'engineer');
    const otherId = uuidv7();
    await caller.post(`/sections/${sectionId}/nets`, { id: otherId, name: 'Flood' }).expect(201);
    const knownPoint = {
      kind: 'knownPoint' as const,
      name: 'K1',
      at: [5, 5] as [number, number],
      offset: 0,
      elevation: 98,
      use: 'fit' as const,
    };
    const id = uuidv7();
    await surveyor.caller.post(`/nets/${otherId}/commands`, batchesOf()([put(knownPoint, id)])).expect(200);
    // Somebody else moves it afterwards, so that only the commands still name her.
    await caller.post(`/nets/${netId}/commands`, batchesOf()([put(knownPoint, id, 1)])).expect(200);
    const line = lineOf([[1, 1]], { finished: false });
    const bystander = await app.signIn('Jon Tracer');
    await addMember(app.db, damId, bystander.person.id, 'engineer');
    await bystander.caller.post(`/nets/${otherId}/commands`, batchesOf()([put(line)])).expect(200);
    const { drawnBy } = await openNet(caller, netId);
    expect(drawnBy.map((person) => person.id).sort()).toEqual([engineer.id, surveyor.person.id].sort());
  });

  it('cannot be read by somebody outside the dam', async () => {
    const { netId } = await addNet(app);
    const { caller } = await app.signIn('Nils Brandt');
    await caller.get(`/nets/${netId}`).expect(404);
    await app.caller().get(`/nets/${netId}`).expect(401);
  });
});
