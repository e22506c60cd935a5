import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import type { Caller } from '#tests/support/caller.ts';
import { addFinishedNet, addNet, addSheet, openNet } from '#tests/support/net-fixture.ts';
import { readyToDecide, reasonsFor, SIGNATURE } from '#tests/support/revision-fixture.ts';
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
  noteId: string | null;
  dueOn: string | null;
  mustAnswer: boolean;
}
const waitingFor = async (caller: Caller): Promise<Waiting[]> =>
  (await caller.get('/waiting').expect(200)).body.items;
const kindsFor = async (caller: Caller) => (await waitingFor(caller)).map((item) => item.kind);

const note = (id: string, text: string) => ({ id, anchor: { on: 'place', at: [1, 1] }, text });

/** Another section on the sheet of a dam. */
async function addSectionOf(damId: string, caller: Caller) {
  const sheet = await app.db
    .getRepository(SheetEntity)
    .createQueryBuilder('s')
    .innerJoin('drawing', 'd', 'd.id = s.drawing_id')
    .where('d.dam_id = :damId', { damId })
    .getOneOrFail();
  const sectionId = uuidv7();
  await caller
    .post(`/sheets/${sheet.id}/sections`, { id: sectionId, name: 'C–C', chainage: '', frame: null })
    .expect(201);
  return { sectionId };
}

async function sent(due: { dueOn?: string } = {}) {
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
    ...due,
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
    await readyToDecide(reviewer.caller, revisionId);
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
    await tove.caller.post(`/nets/${netId}/notes`, note(noteId, 'Is this the new piezometer?')).expect(201);
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

  it('for a reviewer has its day, and what has a day stands first', async () => {
    const { netId, reviewer, revisionId, caller } = await sent({ dueOn: '2099-03-01' });
    await readyToDecide(reviewer.caller, revisionId);
    const noteId = uuidv7();
    await reviewer.caller.post(`/nets/${netId}/notes`, note(noteId, 'Look at line 4.')).expect(201);
    await caller.post(`/notes/${noteId}/answers`, { id: uuidv7(), text: 'Done.' }).expect(201);
    const items = await waitingFor(reviewer.caller);
    expect(items.map(({ kind, dueOn }) => [kind, dueOn])).toEqual([
      ['check', '2099-03-01'],
      ['answer', null],
    ]);
  });

  it('for who drew tells which notes must be answered before acceptance, before others', async () => {
    const { netId, reviewer, revisionId, caller, damId } = await sent();
    await readyToDecide(reviewer.caller, revisionId);
    const [must, other] = [uuidv7(), uuidv7()];
    await reviewer.caller.post(`/nets/${netId}/notes`, note(must, 'Why so steep?')).expect(201);
    await reviewer.caller.put(`/notes/${must}/must-answer`).expect(200);
    const second = uuidv7();
    await caller
      .post(`/sections/${(await addSectionOf(damId, caller)).sectionId}/nets`, { id: second, name: 'Flood' })
      .expect(201);
    await reviewer.caller.post(`/nets/${second}/notes`, note(other, 'And here?')).expect(201);
    const items = (await waitingFor(caller)).filter(({ kind }) => kind === 'answer');
    expect(items.map(({ netId: of, mustAnswer, noteId }) => [of, mustAnswer, noteId])).toEqual([
      [netId, true, must],
      [second, false, other],
    ]);
    expect(items[0]?.detail).toContain('it must be answered before acceptance');
  });

  it('for somebody named in a note is that note, until they have written there or read another’s answer', async () => {
    const { damId, netId, caller } = await addFinishedNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const [asked, told] = [uuidv7(), uuidv7()];
    await caller.post(`/nets/${netId}/notes`, note(asked, '@Tove Lind is this the new tip?')).expect(201);
    const [item] = await waitingFor(tove.caller);
    expect(item).toMatchObject({ kind: 'named', netId, noteId: asked });
    expect(item?.text).toBe('Answer the note that names you on Section B–B');
    expect(item?.detail).toBe('HF-114, Full supply, by Iris Marsh');
    // To have read it is not to have answered it.
    await tove.caller.put(`/notes/${asked}/read`, { entries: 1 }).expect(200);
    expect(await kindsFor(tove.caller)).toEqual(['named']);
    await tove.caller.post(`/notes/${asked}/answers`, { id: uuidv7(), text: 'It is.' }).expect(201);
    expect(await kindsFor(tove.caller)).toEqual([]);

    // Who drew the net is asked to answer once, also when a note names them.
    const toDrawer = note(uuidv7(), '@Iris Marsh please look.');
    await tove.caller.post(`/nets/${netId}/notes`, toDrawer).expect(201);
    expect(await kindsFor(caller)).toEqual(['answer']);

    const remi = await addPerson(damId, 'Remi Okafor', 'reviewer');
    await caller.post(`/nets/${netId}/notes`, note(told, '@Tove Lind or somebody else?')).expect(201);
    await remi.caller.post(`/notes/${told}/answers`, { id: uuidv7(), text: 'From the log.' }).expect(201);
    expect(await kindsFor(tove.caller)).toEqual(['named']);
    await tove.caller.put(`/notes/${told}/read`, { entries: 2 }).expect(200);
    expect(await kindsFor(tove.caller)).toEqual([]);
  });

  it('for who takes part in a net is what is new in notes there, until it is read', async () => {
    const { damId, netId, caller } = await addFinishedNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const remi = await addPerson(damId, 'Remi Okafor', 'reviewer');
    const [own, others] = [uuidv7(), uuidv7()];
    await caller.post(`/nets/${netId}/notes`, note(others, 'The scan is stretched.')).expect(201);
    expect(await kindsFor(tove.caller)).toEqual([]);
    await tove.caller.post(`/nets/${netId}/notes`, note(own, 'Where is the drain?')).expect(201);
    const [item] = await waitingFor(tove.caller);
    expect(item).toMatchObject({ kind: 'unread', netId, noteId: others });
    expect(await kindsFor(remi.caller)).toEqual([]);
    await tove.caller.put(`/notes/${others}/read`, { entries: 1 }).expect(200);
    expect(await kindsFor(tove.caller)).toEqual([]);
  });
});
