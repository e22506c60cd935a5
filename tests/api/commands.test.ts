import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf, singleOf } from '#shared/contract/document.ts';
import { MAX_OPS_PER_BATCH } from '#shared/contract/limits.ts';
import { addNet, batchesOf, lineOf, openNet, put, putSingle } from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const line = lineOf([
  [10, 10],
  [20, 80],
]);

describe('saving by commands', () => {
  it('keeps what was sent and numbers the change', async () => {
    const { caller, netId } = await addNet(app);
    const batch = batchesOf();
    const before = await openNet(caller, netId);
    const { body } = await caller
      .post(
        `/nets/${netId}/commands`,
        batch([put(line), putSingle(before.document, 'netCount', { drops: 10 })]),
      )
      .expect(200);
    expect(body.changeNumber).toBe(1);
    expect(body.outcomes.map((each: { version: number }) => each.version)).toEqual([1, 2]);
    const after = await openNet(caller, netId);
    expect(after.changeNumber).toBe(1);
    expect(entitiesOf(after.document, 'line').map((each) => each.value)).toEqual([line]);
    expect(singleOf(after.document, 'netCount')?.value.drops).toBe(10);
  });

  it('answers a repeat as the first time and applies it once', async () => {
    const { caller, netId } = await addNet(app);
    const sent = batchesOf()([put(line)]);
    const first = await caller.post(`/nets/${netId}/commands`, sent).expect(200);
    const again = await Promise.all(
      [1, 2, 3].map(() => caller.post(`/nets/${netId}/commands`, sent).expect(200)),
    );
    for (const { body } of again) expect(body).toEqual(first.body);
    const after = await openNet(caller, netId);
    expect(after.changeNumber).toBe(1);
    expect(entitiesOf(after.document, 'line')).toHaveLength(1);
  });

  it('applies one of several identical batches that arrive at the same moment', async () => {
    const { caller, netId } = await addNet(app);
    const sent = batchesOf()([put(line)]);
    const answers = await Promise.all(
      Array.from({ length: 6 }, () => caller.post(`/nets/${netId}/commands`, sent)),
    );
    expect(new Set(answers.map(({ status, body }) => JSON.stringify({ status, body }))).size).toBe(1);
    expect((await openNet(caller, netId)).changeNumber).toBe(1);
  });

  it('does not take other changes under a number that was used', async () => {
    const { caller, netId } = await addNet(app);
    const sent = batchesOf()([put(line)]);
    await caller.post(`/nets/${netId}/commands`, sent).expect(200);
    const { body } = await caller.post(`/nets/${netId}/commands`, { ...sent, ops: [put(line)] }).expect(422);
    expect(body.code).toBe('invalid-input');
    expect(entitiesOf((await openNet(caller, netId)).document, 'line')).toHaveLength(1);
  });

  it('answers 409 with both versions where another changed the same line, and applies the rest', async () => {
    const { caller, netId, damId } = await addNet(app);
    const id = uuidv7();
    await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line, id)])).expect(200);
    const other = await app.signIn('Sana Verma');
    await addMember(app.db, damId, other.person.id, 'engineer');
    const theirs = { ...line, name: 'theirs' };
    await other.caller.post(`/nets/${netId}/commands`, batchesOf()([put(theirs, id, 1)])).expect(200);
    const { body } = await caller
      .post(`/nets/${netId}/commands`, batchesOf()([put({ ...line, name: 'mine' }, id, 1), put(line)]))
      .expect(409);
    expect(body.outcomes[0]).toEqual({
      entityId: id,
      outcome: 'conflict',
      version: 2,
      current: { id, version: 2, value: theirs },
      changedBy: { id: other.person.id, name: 'Sana Verma' },
    });
    expect(body.outcomes[1]).toMatchObject({ outcome: 'applied', version: 1 });
    expect(body.changeNumber).toBe(3);
  });

  it('does not count a batch of which nothing was applied', async () => {
    const { caller, netId } = await addNet(app);
    const { body } = await caller
      .post(`/nets/${netId}/commands`, batchesOf()([put(line, uuidv7(), 4)]))
      .expect(409);
    expect(body.changeNumber).toBe(0);
    expect(
      await app.db.query("SELECT 1 FROM event WHERE net_id = $1 AND type = 'net.changed'", [netId]),
    ).toEqual([]);
  });

  it('refuses a batch with a fault whole and says which op it is', async () => {
    const { caller, netId } = await addNet(app);
    const { document } = await openNet(caller, netId);
    const count = singleOf(document, 'netCount');
    const { body } = await caller
      .post(`/nets/${netId}/commands`, batchesOf()([put(line), put(count!.value)]))
      .expect(400);
    expect(body.errors).toMatchObject([{ path: 'ops.1' }]);
    expect(entitiesOf((await openNet(caller, netId)).document, 'line')).toEqual([]);
  });

  it('refuses values that are no document entities, and a batch that is too long', async () => {
    const { caller, netId } = await addNet(app);
    const wrong = { op: 'put', entityId: uuidv7(), baseVersion: 0, value: { kind: 'line', line: 'river' } };
    await caller
      .post(`/nets/${netId}/commands`, { clientId: uuidv7(), seq: 1, label: '', ops: [wrong] })
      .expect(400);
    const many = Array.from({ length: MAX_OPS_PER_BATCH + 1 }, () => put(line));
    await caller.post(`/nets/${netId}/commands`, batchesOf()(many)).expect(400);
  });

  it('says so when a text holds a character that cannot be kept', async () => {
    const { caller, netId } = await addNet(app);
    for (const name of ['a\u0000b', 'half \ud83d pair']) {
      const { body } = await caller
        .post(`/nets/${netId}/commands`, batchesOf()([put({ ...line, name })]))
        .expect(400);
      expect(body.detail).toMatch(/cannot be kept/);
    }
  });

  it('takes an id in capitals for the entity it names', async () => {
    const { caller, netId } = await addNet(app);
    const id = uuidv7();
    await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line, id)])).expect(200);
    await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line, id.toUpperCase())])).expect(409);
  });

  it('leaves a net that is put away as it is', async () => {
    const { caller, netId } = await addNet(app);
    await caller.post(`/nets/${netId}/archive`).expect(200);
    const { body } = await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line)])).expect(422);
    expect(body).toMatchObject({ code: 'conflict', detail: expect.stringMatching(/put away/) });
  });

  it('is for engineers of the dam', async () => {
    const { netId, damId } = await addNet(app);
    for (const role of ['reviewer', 'colleague'] as const) {
      const { person, caller } = await app.signIn('Tove Lind');
      await addMember(app.db, damId, person.id, role);
      await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line)])).expect(403);
    }
  });

  it('tells who did what, and tells open browsers of the number', async () => {
    const { caller, netId, damId } = await addNet(app);
    const sent = batchesOf()([put(line)], 'traced equipotential 3');
    app.live.published.length = 0;
    await caller.post(`/nets/${netId}/commands`, sent).expect(200);
    expect(app.live.published).toEqual([{ type: 'net', damId, netId, number: 1, clientId: sent.clientId }]);
    const [event] = await app.db.query("SELECT text FROM event WHERE net_id = $1 AND type = 'net.changed'", [
      netId,
    ]);
    expect(event.text).toBe('traced equipotential 3 on Section B–B, Full supply');
  });
});

describe('known points', () => {
  const known = { kind: 'knownPoint', name: 'K1', at: [5, 5], offset: 0, elevation: 98, use: 'fit' } as const;

  it('belong to all nets of a section, which all take the same new number', async () => {
    const { caller, netId, sectionId } = await addNet(app);
    await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line)])).expect(200);
    const otherId = uuidv7();
    await caller.post(`/sections/${sectionId}/nets`, { id: otherId, name: 'Flood' }).expect(201);
    app.live.published.length = 0;
    const { body } = await caller
      .post(`/nets/${otherId}/commands`, batchesOf()([put({ ...known, at: [5, 5] })]))
      .expect(200);
    expect(body.changeNumber).toBe(2);
    for (const each of [netId, otherId]) {
      const detail = await openNet(caller, each);
      expect(detail.changeNumber).toBe(2);
      expect(entitiesOf(detail.document, 'knownPoint')).toHaveLength(1);
    }
    expect(app.live.published.map((event) => event.type === 'net' && event.netId).sort()).toEqual(
      [netId, otherId].sort(),
    );
  });

  it('two of them calibrate the section', async () => {
    const { caller, netId } = await addNet(app);
    const second = { ...known, name: 'K2', at: [1005, 5] as [number, number], offset: 50 };
    await caller
      .post(`/nets/${netId}/commands`, batchesOf()([put({ ...known, at: [5, 5] }), put(second)]))
      .expect(200);
    expect((await openNet(caller, netId)).section.calibrated).toBe(true);
  });
});

describe('catching up', () => {
  it('gives what changed after a number, removed entities without a value', async () => {
    const { caller, netId, engineer } = await addNet(app);
    const batch = batchesOf();
    const [kept, removed, later] = [uuidv7(), uuidv7(), uuidv7()];
    await caller.post(`/nets/${netId}/commands`, batch([put(line, kept), put(line, removed)])).expect(200);
    const sent = batch([put(line, later), { op: 'remove', entityId: removed, baseVersion: 1 }]);
    await caller.post(`/nets/${netId}/commands`, sent).expect(200);
    const { body } = await caller.get(`/nets/${netId}/changes?since=1`).expect(200);
    const by = { changedBy: { id: engineer.id, name: engineer.name }, clientId: sent.clientId };
    expect(body).toEqual({
      changeNumber: 2,
      entities: [
        { id: removed, version: 2, value: null, ...by },
        { id: later, version: 1, value: line, ...by },
      ],
    });
    expect((await caller.get(`/nets/${netId}/changes?since=2`).expect(200)).body.entities).toEqual([]);
    await caller.get(`/nets/${netId}/changes?since=-1`).expect(400);
  });
});

describe('copying a net for another load case', () => {
  it('copies the lines under new ids, shares the known points and leaves the source alone', async () => {
    const { caller, netId } = await addNet(app);
    const known = {
      kind: 'knownPoint',
      name: 'K1',
      at: [5, 5],
      offset: 0,
      elevation: 98,
      use: 'fit',
    } as const;
    await caller
      .post(`/nets/${netId}/commands`, batchesOf()([put(line), put({ ...known, at: [5, 5] })]))
      .expect(200);
    const copyId = uuidv7();
    const { body } = await caller
      .post(`/nets/${netId}/copy`, { id: copyId, name: 'Flood level' })
      .expect(201);
    expect(body).toMatchObject({ id: copyId, name: 'Flood level', state: 'draft' });
    const source = (await openNet(caller, netId)).document;
    const copy = (await openNet(caller, copyId)).document;
    expect(entitiesOf(copy, 'knownPoint')).toEqual(entitiesOf(source, 'knownPoint'));
    expect(entitiesOf(copy, 'line').map((each) => each.value)).toEqual([line]);
    expect(entitiesOf(copy, 'line')[0]?.id).not.toBe(entitiesOf(source, 'line')[0]?.id);
    await caller
      .post(`/nets/${copyId}/commands`, batchesOf()([putSingle(copy, 'waterLevels', { headwater: 121 })]))
      .expect(200);
    expect(singleOf((await openNet(caller, netId)).document, 'waterLevels')?.value.headwater).toBeNull();
  });

  it('counts who drew the source among those who drew the copy', async () => {
    const { caller, netId, damId, engineer } = await addNet(app);
    const tracer = await app.signIn('Sana Verma');
    await addMember(app.db, damId, tracer.person.id, 'engineer');
    const id = uuidv7();
    await tracer.caller.post(`/nets/${netId}/commands`, batchesOf()([put(line, id)])).expect(200);
    // Her line is replaced, so no entity names her any more; the commands still do.
    await caller.post(`/nets/${netId}/commands`, batchesOf()([put(line, id, 1)])).expect(200);
    const copyId = uuidv7();
    await caller.post(`/nets/${netId}/copy`, { id: copyId, name: 'Flood level' }).expect(201);
    const { drawnBy } = await openNet(caller, copyId);
    expect(drawnBy.map((person) => person.id).sort()).toEqual([engineer.id, tracer.person.id].sort());
  });
});
