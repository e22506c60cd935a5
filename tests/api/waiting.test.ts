import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import type { Caller } from '#tests/support/caller.ts';
import { addFinishedNet, addNet, addSheet, openNet } from '#tests/support/net-fixture.ts';
import { reasonsFor, SIGNATURE } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

async function addPerson(damId: string, name: string, ...roles: DamRole[]) {
  const { person, caller } = await app.signIn(name);
  await addMember(app.db, damId, person.id, ...roles);
  return { person, caller };
}

interface Waiting {
  kind: string;
  text: string;
  detail: string;
  netId: string | null;
  revisionId: string | null;
  drawingId: string | null;
}
const waitingFor = async (caller: Caller): Promise<Waiting[]> =>
  (await caller.get('/waiting').expect(200)).body.items;
const kindsFor = async (caller: Caller) => (await waitingFor(caller)).map((item) => item.kind);

async function sent() {
  const place = await addFinishedNet(app);
  const reviewer = await addPerson(place.damId, 'Remi Okafor', 'reviewer');
  const revisionId = uuidv7();
  const { changeNumber } = await openNet(place.caller, place.netId);
  const input = {
    id: revisionId,
    reviewerIds: [reviewer.person.id],
    message: '',
    changeNumber,
    reasons: await reasonsFor(place.caller, place.netId),
  };
  await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
  return { ...place, reviewer, revisionId };
}

describe('what waits', () => {
  it('for a reviewer is the revision sent to them, until it is decided', async () => {
    const { damId, reviewer, revisionId, netId, caller } = await sent();
    const second = await addPerson(damId, 'Another Reviewer', 'reviewer');
    const [item] = await waitingFor(reviewer.caller);
    expect(item).toMatchObject({ kind: 'check', netId, revisionId });
    expect(item?.text).toMatch(/^Check revision A of Section /);
    expect(await waitingFor(second.caller)).toEqual([]);
    const decision = { decision: 'returned', note: 'Line 4 crosses the drain.', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, decision).expect(201);
    expect(await waitingFor(reviewer.caller)).toEqual([]);
    const back = (await waitingFor(caller)).find((each) => each.kind === 'returned');
    expect(back).toMatchObject({ netId, revisionId });
    expect(back?.detail).toContain('returned by Remi Okafor');
  });

  it('ends with the reviewer’s part on the dam', async () => {
    const { damId, reviewer } = await sent();
    await app.db.query('DELETE FROM membership WHERE dam_id = $1 AND person_id = $2', [
      damId,
      reviewer.person.id,
    ]);
    expect(await waitingFor(reviewer.caller)).toEqual([]);
  });

  it('for who drew is a note of somebody else, and for its author the answer to it', async () => {
    const { damId, netId, caller } = await addFinishedNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const noteId = uuidv7();
    const note = { id: noteId, anchor: { on: 'place', at: [1, 1] }, text: 'Is this the new piezometer?' };
    await tove.caller.post(`/nets/${netId}/notes`, note).expect(201);
    const [item] = await waitingFor(caller);
    expect(item).toMatchObject({ kind: 'answer', netId });
    expect(item?.text).toMatch(/^Answer a note on Section /);
    expect(await waitingFor(tove.caller)).toEqual([]);
    await caller.post(`/notes/${noteId}/answers`, { id: uuidv7(), text: 'It is.' }).expect(201);
    expect(await kindsFor(caller)).toEqual([]);
    expect((await waitingFor(tove.caller))[0]?.text).toMatch(/^Read the answer to your note/);
    await tove.caller.post(`/notes/${noteId}/close`).expect(200);
    expect(await waitingFor(tove.caller)).toEqual([]);
  });

  it('for an engineer is the net they began, and no longer once it is put away', async () => {
    const { damId, netId, caller } = await addNet(app);
    const [item] = await waitingFor(caller);
    expect(item).toMatchObject({ kind: 'calibrate', netId, text: 'Put Section B–B, Full supply to scale' });
    const other = await addPerson(damId, 'Another Engineer', 'engineer');
    expect(await waitingFor(other.caller)).toEqual([]);
    await caller
      .post(`/nets/${netId}/archive`)
      .expect((response) => expect(response.status).toBeLessThan(300));
    expect(await waitingFor(caller)).toEqual([]);
  });

  it('for who uploaded a drawing is to put it to scale, once it is drawn', async () => {
    const { person, caller } = await app.signIn('Uploader');
    const damId = await addDam(app.db, person.id);
    await addMember(app.db, damId, person.id, 'engineer');
    const sheetId = await addSheet(app, damId, person.id);
    const { drawingId } = await app.db.getRepository(SheetEntity).findOneByOrFail({ id: sheetId });
    const id = uuidv7();
    await app.db.getRepository(RenderJobEntity).insert({ id, drawingId, state: 'running' });
    expect(await waitingFor(caller)).toEqual([]);
    await app.db.getRepository(RenderJobEntity).update({ id }, { state: 'done' });
    expect(await waitingFor(caller)).toMatchObject([
      { kind: 'calibrate', text: 'Put HF-114 to scale', drawingId, netId: null },
    ]);
  });
});
