import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DamRole } from '#shared/contract/actions.ts';
import { NOTE_EDIT_MINUTES } from '#shared/contract/limits.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import type { Caller } from '#tests/support/caller.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { addNet } from '#tests/support/net-fixture.ts';
import { mailsFor, SIGNATURE, sentRevision } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addMember } from '#tests/support/test-people.ts';

let app: TestApp;
/** Minutes by which the application's clock is ahead. */
let minutesOn = 0;
beforeAll(async () => {
  app = await createTestApp({ clock: { now: () => new Date(Date.now() + minutesOn * 60_000) } });
});
afterAll(() => app.close());

const noteOf = (text: string, more: object = {}) => ({
  id: uuidv7(),
  anchor: { on: 'place', at: [12.5, 30] },
  text,
  ...more,
});
async function addPerson(damId: string, name: string, ...roles: DamRole[]) {
  const { person, caller } = await app.signIn(name);
  await addMember(app.db, damId, person.id, ...roles);
  return { person, caller };
}
const listOf = async (caller: Caller, netId: string): Promise<NoteDto[]> =>
  (await caller.get(`/nets/${netId}/notes`).expect(200)).body.items;

describe('what a note is about', () => {
  it('is also a cell, a profile, a figure of the title block or the drawing as a whole', async () => {
    const { caller, netId } = await addNet(app);
    const anchors = [
      { on: 'cell', heads: [uuidv7(), uuidv7()], flows: [uuidv7(), uuidv7()], at: [3, 4] },
      { on: 'profile', entityId: uuidv7(), at: [3, 4] },
      { on: 'titleBlock', cell: 'headPerDrop' },
      { on: 'drawing' },
    ];
    for (const anchor of anchors)
      await caller.post(`/nets/${netId}/notes`, noteOf('Here', { anchor })).expect(201);
    expect((await listOf(caller, netId)).map((note) => note.anchor)).toEqual(anchors);
  });

  it('is no cell with three sides and no figure that the title block lacks', async () => {
    const { caller, netId } = await addNet(app);
    const open = { on: 'cell', heads: [uuidv7(), uuidv7()], flows: [uuidv7()], at: [3, 4] };
    await caller.post(`/nets/${netId}/notes`, noteOf('Here', { anchor: open })).expect(400);
    const unknown = { on: 'titleBlock', cell: 'weather' };
    await caller.post(`/nets/${netId}/notes`, noteOf('Here', { anchor: unknown })).expect(400);
  });
});

describe('a note that must be answered before acceptance', () => {
  it('is marked by a reviewer only, who is told with the time, and is open to no early closing', async () => {
    const { caller, netId, damId } = await addNet(app);
    const reviewer = await addPerson(damId, 'Remi Okafor', 'reviewer');
    const note = noteOf('Where does k come from?');
    await reviewer.caller.post(`/nets/${netId}/notes`, note).expect(201);
    await caller.put(`/notes/${note.id}/must-answer`).expect(403);
    const { body } = await reviewer.caller.put(`/notes/${note.id}/must-answer`).expect(200);
    expect(body.mustAnswer).toMatchObject({ by: { name: 'Remi Okafor' }, at: expect.any(String) });
    const refused = await caller.post(`/notes/${note.id}/close`).expect(409);
    expect(refused.body.detail).toMatch(/answered before acceptance/);
    await caller
      .post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'From a pumping test.' })
      .expect(201);
    const closed = await caller.post(`/notes/${note.id}/close`).expect(200);
    expect(closed.body.answered.by.name).toBe('Iris Marsh');
  });

  it('holds acceptance up with the list, lets a revision be returned, and ends with the answer', async () => {
    const { revisionId, reviewer, netId, caller } = await sentRevision(app);
    const note = noteOf('Where does k come from?');
    await reviewer.caller.post(`/nets/${netId}/notes`, note).expect(201);
    await reviewer.caller.put(`/notes/${note.id}/must-answer`).expect(200);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    const { body } = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept);
    expect(body).toMatchObject({
      status: 409,
      code: 'conflict',
      extra: { notes: [{ id: note.id, number: 1, text: 'Where does k come from?' }] },
    });
    expect(body.detail).toContain('note 1 (Where does k come from?)');
    await caller
      .post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'From a pumping test.' })
      .expect(201);
    const after = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept);
    // Whatever else acceptance asks for, this note is no part of it any more.
    expect(after.body.extra?.notes).toBeUndefined();
  });

  it('can be let go by a reviewer', async () => {
    const { netId, damId } = await addNet(app);
    const reviewer = await addPerson(damId, 'Remi Okafor', 'reviewer');
    const note = noteOf('Is it?');
    await reviewer.caller.post(`/nets/${netId}/notes`, note).expect(201);
    await reviewer.caller.put(`/notes/${note.id}/must-answer`).expect(200);
    const { body } = await reviewer.caller.delete(`/notes/${note.id}/must-answer`).expect(200);
    expect(body.mustAnswer).toBeNull();
  });
});

describe('a name with @', () => {
  it('is kept with the entry and mailed once to members who can sign in, never to the author', async () => {
    const { caller, netId, damId, engineer } = await addNet(app);
    const { person: tove } = await addPerson(damId, 'Tove Lind', 'colleague');
    const { person: stranger } = await app.signIn('Nils Brandt');
    const note = noteOf('@Tove Lind, @Iris Marsh and @Nils Brandt: <b>is</b> the drain open? @tove lind');
    const { body } = await caller.post(`/nets/${netId}/notes`, note).expect(201);
    expect(body.entries[0].named.map((each: { name: string }) => each.name).sort()).toEqual([
      'Iris Marsh',
      'Tove Lind',
    ]);
    await caller.post(`/nets/${netId}/notes`, note).expect(201);
    const [mail, ...more] = await mailsFor(app, tove.id);
    expect(more).toEqual([]);
    expect(mail?.subject).toMatch(/^Note 1 names you: /);
    expect(mail?.text).toContain(`/nets/${netId}#note-${note.id}`);
    const [{ html }] = await app.db.query('SELECT html FROM outbox_mail WHERE person_id = $1', [tove.id]);
    expect(html).toContain('&lt;b&gt;is&lt;/b&gt;');
    expect(await mailsFor(app, engineer.id)).toEqual([]);
    expect(await mailsFor(app, stranger.id)).toEqual([]);
  });

  it('is mailed from a change only when it is new', async () => {
    const { caller, netId, damId } = await addNet(app);
    const { person: tove } = await addPerson(damId, 'Tove Lind', 'colleague');
    const { person: remi } = await addPerson(damId, 'Remi Okafor', 'reviewer');
    const note = noteOf('@Tove Lind?');
    const { body } = await caller.post(`/nets/${netId}/notes`, note).expect(201);
    await caller
      .patch(`/notes/${note.id}/entries/${body.entries[0].id}`, { text: '@Tove Lind or @Remi Okafor?' })
      .expect(200);
    expect(await mailsFor(app, tove.id)).toHaveLength(1);
    expect(await mailsFor(app, remi.id)).toHaveLength(1);
  });
});

describe('changing a text', () => {
  it('is for its author and for a while, and keeps what was said before', async () => {
    const { caller, netId, damId } = await addNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const note = noteOf('The tip is at 101.4');
    const { body } = await caller.post(`/nets/${netId}/notes`, note).expect(201);
    const address = `/notes/${note.id}/entries/${body.entries[0].id}`;
    await tove.caller.patch(address, { text: 'Mine' }).expect(403);
    const changed = await caller.patch(address, { text: 'The tip is at 104.1' }).expect(200);
    expect(changed.body.entries[0]).toMatchObject({
      text: 'The tip is at 104.1',
      editedAt: expect.any(String),
    });
    const earlier = await tove.caller.get(`${address}/earlier`).expect(200);
    expect(earlier.body.items).toMatchObject([{ text: 'The tip is at 101.4' }]);
    minutesOn = NOTE_EDIT_MINUTES + 1;
    const late = await caller.patch(address, { text: 'Again' }).expect(409);
    minutesOn = 0;
    expect(late.body.detail).toMatch(/15 minutes/);
  });

  it('cannot touch what was said before through SQL as the application', async () => {
    await expect(app.db.query('UPDATE note_entry_earlier SET text = $1', ['x'])).rejects.toThrow(
      /permission/,
    );
    await expect(app.db.query('DELETE FROM note_entry_earlier')).rejects.toThrow(/permission/);
  });
});

describe('a file of a note', () => {
  async function uploadTo(caller: Caller, netId: string, bytes: Buffer, name: string) {
    const fileId = uuidv7();
    const sent = await caller.post(`/nets/${netId}/note-files?id=${fileId}`).attach('file', bytes, name);
    return { fileId, sent };
  }

  it('is refused without a token, of an unknown kind, and to who may not write', async () => {
    const { caller, netId } = await addNet(app);
    const page = Buffer.from('<html><script>alert(1)</script></html>');
    const { sent } = await uploadTo(caller, netId, page, 'photo.png');
    expect(sent.status).toBe(415);
    const stranger = await app.signIn('Nils Brandt');
    const png = await pngDrawing();
    expect((await uploadTo(stranger.caller, netId, png, 'a.png')).sent.status).toBe(404);
    caller.csrfToken = 'wrong';
    expect((await uploadTo(caller, netId, png, 'a.png')).sent.body.code).toBe('csrf');
  });

  it('is kept with its text, shown small only as a picture, and served to those of the dam alone', async () => {
    const { caller, netId, damId } = await addNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const png = await pngDrawing();
    const { fileId, sent } = await uploadTo(caller, netId, png, '..\\..\\etc/pic\u202egnp.png');
    expect(sent.body).toMatchObject({ id: fileId, fileName: 'picgnp.png', mediaType: 'image/png' });
    const address = `/nets/${netId}/note-files/${fileId}`;
    await tove.caller.get(address).expect(404);
    const note = noteOf('As seen', { fileIds: [fileId] });
    const { body } = await caller.post(`/nets/${netId}/notes`, note).expect(201);
    expect(body.entries[0].files).toMatchObject([{ id: fileId, byteSize: png.length }]);
    const served = await tove.caller.get(address).expect(200);
    expect(served.headers['content-type']).toBe('image/png');
    expect(served.headers['x-content-type-options']).toBe('nosniff');
    expect(served.headers['content-security-policy']).toContain('sandbox');
    expect(Buffer.compare(served.body, png)).toBe(0);
    const stranger = await app.signIn('Nils Brandt');
    await stranger.caller.get(address).expect(404);
    const elsewhere = await addNet(app);
    await elsewhere.caller.get(`/nets/${elsewhere.netId}/note-files/${fileId}`).expect(404);
  });

  it('that is a PDF leaves as a download', async () => {
    const { caller, netId } = await addNet(app);
    const { fileId } = await uploadTo(caller, netId, Buffer.from('%PDF-1.4\n%%EOF\n'), 'report.pdf');
    const served = await caller.get(`/nets/${netId}/note-files/${fileId}`).expect(200);
    expect(served.headers['content-disposition']).toContain('attachment');
  });

  it('belongs to one text of its own uploader', async () => {
    const { caller, netId, damId } = await addNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const { fileId } = await uploadTo(caller, netId, await pngDrawing(), 'a.png');
    const mine = { fileIds: [fileId] };
    await tove.caller.post(`/nets/${netId}/notes`, noteOf('Taken', mine)).expect(400);
    await caller.post(`/nets/${netId}/notes`, noteOf('First', mine)).expect(201);
    await caller.post(`/nets/${netId}/notes`, noteOf('Second', mine)).expect(400);
    expect(await listOf(caller, netId)).toHaveLength(1);
  });
});

describe('what is unread', () => {
  it('counts entries of others beyond those seen, for each person alone', async () => {
    const { caller, netId, damId, engineer } = await addNet(app);
    const tove = await addPerson(damId, 'Tove Lind', 'colleague');
    const note = noteOf('First');
    await tove.caller.post(`/nets/${netId}/notes`, note).expect(201);
    await tove.caller.post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'Second' }).expect(201);
    expect((await listOf(caller, netId))[0]?.unread).toBe(2);
    expect((await listOf(tove.caller, netId))[0]?.unread).toBe(0);
    const newOnDam = async (by: Caller) => (await by.get(`/dams/${damId}`).expect(200)).body.unreadNoteCount;
    expect([await newOnDam(caller), await newOnDam(tove.caller)]).toEqual([1, 0]);
    app.live.published.length = 0;
    await caller.put(`/notes/${note.id}/read`, { entries: 1 }).expect(200);
    expect(app.live.published).toEqual([{ type: 'notesRead', personId: engineer.id, netId }]);
    expect((await listOf(caller, netId))[0]?.unread).toBe(1);
    await caller.put(`/notes/${note.id}/read`, { entries: 99 }).expect(200);
    expect(await newOnDam(caller)).toBe(0);
    // A late report from another window takes nothing back.
    await caller.put(`/notes/${note.id}/read`, { entries: 1 }).expect(200);
    expect((await listOf(caller, netId))[0]?.unread).toBe(0);
    await tove.caller.post(`/notes/${note.id}/answers`, { id: uuidv7(), text: 'Third' }).expect(201);
    expect((await listOf(caller, netId))[0]?.unread).toBe(1);
  });
});
