import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DamRole } from '#shared/contract/actions.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { addNet, openNet } from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const noteOf = (text: string, id = uuidv7()) => ({ id, anchor: { on: 'place', at: [12.5, 30] }, text });

async function addPerson(damId: string, name: string, role: DamRole) {
  const { person, caller } = await app.signIn(name);
  await addMember(app.db, damId, person.id, role);
  return { person, caller };
}

describe('a note', () => {
  it('is refused without text, and with more than can be kept', async () => {
    const { caller, netId } = await addNet(app);
    await caller.post(`/nets/${netId}/notes`, noteOf('   ')).expect(400);
    await caller.post(`/nets/${netId}/notes`, noteOf('x'.repeat(MAX_NOTE_LENGTH + 1))).expect(400);
  });

  it('is written by a colleague, numbered within the net and told to others', async () => {
    const { caller, netId, damId } = await addNet(app);
    const { person, caller: colleague } = await addPerson(damId, 'Tove Lind', 'colleague');
    app.live.published.length = 0;
    const entityId = uuidv7();
    const anchor = { on: 'readingPoint', entityId, at: [100, 200] };
    const { body } = await colleague
      .post(`/nets/${netId}/notes`, { ...noteOf('The tip was replaced in 1998.'), anchor })
      .expect(201);
    expect(body).toMatchObject({ number: 1, state: 'open', anchor, closedBy: null });
    expect(body.entries).toMatchObject([{ author: { id: person.id, name: 'Tove Lind' } }]);
    await colleague.post(`/nets/${netId}/notes`, noteOf('Second')).expect(201);
    const list = await caller.get(`/nets/${netId}/notes`).expect(200);
    expect(list.body.items.map((note: NoteDto) => note.number)).toEqual([1, 2]);
    expect(app.live.published).toEqual([
      { type: 'notes', damId, netId },
      { type: 'notes', damId, netId },
    ]);
    expect((await openNet(caller, netId)).net.openNotes).toBe(2);
  });

  it('is written once however often it is sent', async () => {
    const { caller, netId } = await addNet(app);
    const note = noteOf('Once');
    await caller.post(`/nets/${netId}/notes`, note).expect(201);
    await caller.post(`/nets/${netId}/notes`, note).expect(201);
    const { body } = await caller.get(`/nets/${netId}/notes`).expect(200);
    expect(body.items).toHaveLength(1);
    expect(body.items[0].entries).toHaveLength(1);
  });

  it('does not take the id of a note on another net', async () => {
    const { caller, netId } = await addNet(app);
    const elsewhere = await addNet(app);
    const note = noteOf('Elsewhere');
    await elsewhere.caller.post(`/nets/${elsewhere.netId}/notes`, note).expect(201);
    await caller.post(`/nets/${netId}/notes`, note).expect(409);
  });

  it('numbers without a gap when many write at once', async () => {
    const { caller, netId } = await addNet(app);
    await Promise.all(
      Array.from({ length: 12 }, (_, i) => caller.post(`/nets/${netId}/notes`, noteOf(`${i}`)).expect(201)),
    );
    const { body } = await caller.get(`/nets/${netId}/notes`).expect(200);
    expect(body.items.map((note: NoteDto) => note.number)).toEqual(
      Array.from({ length: 12 }, (_, i) => i + 1),
    );
  });

  it('becomes answered by somebody else and open again by its author', async () => {
    const { caller, netId, damId } = await addNet(app);
    const { caller: reviewer } = await addPerson(damId, 'Remi Okafor', 'reviewer');
    const note = noteOf('Is the trench as deep as built?');
    await reviewer.post(`/nets/${netId}/notes`, note).expect(201);
    const answer = await caller
      .post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'By HF-120 it is.' })
      .expect(201);
    expect(answer.body.state).toBe('answered');
    const more = await reviewer
      .post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'Which sheet?' })
      .expect(201);
    expect(more.body.state).toBe('open');
    expect(more.body.entries.map((entry: { text: string }) => entry.text)).toEqual([
      'Is the trench as deep as built?',
      'By HF-120 it is.',
      'Which sheet?',
    ]);
  });

  it('takes an answer once however often it is sent', async () => {
    const { caller, netId } = await addNet(app);
    const note = noteOf('Question');
    await caller.post(`/nets/${netId}/notes`, note).expect(201);
    const answer = { id: uuidv7(), text: 'More' };
    await caller.post(`/notes/${note.id}/answers`, answer).expect(201);
    const { body } = await caller.post(`/notes/${note.id}/answers`, answer).expect(201);
    expect(body.entries).toHaveLength(2);
  });

  it('is closed with who and when, takes no answer then, and can be reopened', async () => {
    const { caller, netId, engineer } = await addNet(app);
    const note = noteOf('Done?');
    await caller.post(`/nets/${netId}/notes`, note).expect(201);
    const closed = await caller.post(`/notes/${note.id}/close`).expect(200);
    expect(closed.body).toMatchObject({ state: 'closed', closedBy: { id: engineer.id } });
    expect((await openNet(caller, netId)).net.openNotes).toBe(0);
    const refused = await caller
      .post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'Late' })
      .expect(409);
    expect(refused.body.detail).toMatch(/Reopen it/);
    const again = await caller.post(`/notes/${note.id}/close`).expect(200);
    expect(again.body.closedAt).toBe(closed.body.closedAt);
    const open = await caller.post(`/notes/${note.id}/reopen`).expect(200);
    expect(open.body).toMatchObject({ state: 'open', closedBy: null, closedAt: null });
  });

  it('cannot be written by an administrator without a part on the dam, nor seen by a stranger', async () => {
    const { caller, netId } = await addNet(app);
    const note = noteOf('Ours');
    await caller.post(`/nets/${netId}/notes`, note).expect(201);
    const admin = await app.signIn('Ada Quist', { admin: true });
    await admin.caller.get(`/nets/${netId}/notes`).expect(200);
    await admin.caller.post(`/nets/${netId}/notes`, noteOf('Mine')).expect(403);
    const stranger = await app.signIn('Nils Brandt');
    await stranger.caller.post(`/notes/${note.id}/close`).expect(404);
  });

  it('cannot be added to a net that is put away', async () => {
    const { caller, netId } = await addNet(app);
    await caller.post(`/nets/${netId}/archive`).expect(200);
    await caller.post(`/nets/${netId}/notes`, noteOf('Late')).expect(409);
  });
});
