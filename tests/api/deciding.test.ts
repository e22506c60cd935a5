import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openNet } from '#tests/support/net-fixture.ts';
import {
  addRolePerson,
  beginLine,
  mailsFor,
  readyToDecide,
  SIGNATURE,
  sendInputFor,
  sentRevision,
} from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

describe('deciding', () => {
  it('needs a note when the revision is returned', async () => {
    const { revisionId, reviewer } = await sentRevision(app);
    const { body } = await reviewer.caller
      .post(`/revisions/${revisionId}/decision`, { decision: 'returned', note: '  ', ...SIGNATURE })
      .expect(400);
    expect(body.errors[0].path).toBe('note');
  });

  it('accepts once, and mails the sender and who drew', async () => {
    const { revisionId, reviewer, netId, caller, engineer } = await sentRevision(app);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    const { body } = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(201);
    expect(body.summary.decision).toMatchObject({
      decision: 'accepted',
      decidedBy: { name: 'Remi Okafor' },
    });
    expect(body.decideRefusal).toMatch(/has been decided/);
    const again = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(409);
    expect(again.body.code).toBe('already-decided');
    expect((await openNet(caller, netId)).net).toMatchObject({ state: 'accepted', revisionLabel: 'A' });
    const mails = await mailsFor(app, engineer.id);
    expect(mails.map((mail) => mail.subject)).toEqual([
      'Accepted: Harrow Fen Dam, HF-114 rev C, Section B–B, chainage 212, revision A',
    ]);
  });

  it('takes one of two decisions made at the same moment', async () => {
    const { revisionId, reviewer } = await sentRevision(app);
    const answers = await Promise.all(
      ['accepted', 'returned'].map((decision) =>
        reviewer.caller.post(`/revisions/${revisionId}/decision`, { decision, note: 'Seen.', ...SIGNATURE }),
      ),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
  });

  it('returns with a note, after which a changed net is sent as the next letter, chained to the one before', async () => {
    const place = await sentRevision(app);
    const { revisionId, reviewer, netId, caller } = place;
    const back = { decision: 'returned', note: 'Line 3 is off.', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, back).expect(201);
    expect((await openNet(caller, netId)).net.state).toBe('returned');
    await beginLine(caller, netId);
    expect((await openNet(caller, netId)).net.changedSinceRevision).toBe(true);
    const input = await sendInputFor(place, reviewer.person.id);
    const second = await caller.post(`/nets/${netId}/revisions`, input).expect(201);
    expect(second.body.label).toBe('B');
    await readyToDecide(reviewer.caller, input.id);
    const first = await reviewer.caller.get(`/revisions/${revisionId}`).expect(200);
    const opened = await reviewer.caller.get(`/revisions/${input.id}`).expect(200);
    expect(opened.body.payload.previousHash).toBe(first.body.summary.hash);
    const [, again] = await mailsFor(app, reviewer.person.id);
    expect(again?.text).toContain('Since the revision before:\n1 line added.\n');
  });

  it('is refused to who drew, also when an engineer and reviewer in one person', async () => {
    const place = await sentRevision(app);
    const both = await addRolePerson(app, place.damId, 'Ada Both', 'engineer', 'reviewer');
    await beginLine(both.caller, place.netId);
    const input = await sendInputFor(place, place.reviewer.person.id);
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    const { body } = await both.caller.post(`/revisions/${input.id}/decision`, accept).expect(403);
    expect(body.code).toBe('own-work');
    const seen = await both.caller.get(`/revisions/${input.id}`).expect(200);
    expect(seen.body.decideRefusal).toMatch(/another person has to check it/);
  });

  it('is refused to another reviewer, to an engineer, and on a revision that was followed by a later one', async () => {
    const place = await sentRevision(app);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    const other = await addRolePerson(app, place.damId, 'Lena Fogh', 'reviewer');
    const refused = await other.caller.post(`/revisions/${place.revisionId}/decision`, accept).expect(403);
    expect(refused.body.detail).toMatch(/another reviewer/);
    await place.caller.post(`/revisions/${place.revisionId}/decision`, accept).expect(403);
    await beginLine(place.caller, place.netId);
    const input = await sendInputFor(place, place.reviewer.person.id);
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    const late = await place.reviewer.caller
      .post(`/revisions/${place.revisionId}/decision`, accept)
      .expect(409);
    expect(late.body.detail).toMatch(/Revision B of this net was sent since/);
  });

  it('waits while the net is put away', async () => {
    const { revisionId, reviewer, netId, caller } = await sentRevision(app);
    await caller.post(`/nets/${netId}/archive`).expect(200);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(409);
    const { body } = await reviewer.caller.get(`/revisions/${revisionId}`).expect(200);
    expect(body.decideRefusal).toMatch(/put away/);
    expect(body.can).not.toContain('revision.decide');
    await caller.post(`/nets/${netId}/restore`).expect(200);
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(201);
  });

  it('is not for somebody who is a reviewer of the dam no longer', async () => {
    const { revisionId, reviewer, damId } = await sentRevision(app);
    await app.db.query('UPDATE membership SET roles = $1 WHERE dam_id = $2 AND person_id = $3', [
      ['colleague'],
      damId,
      reviewer.person.id,
    ]);
    await reviewer.caller
      .post(`/revisions/${revisionId}/decision`, { decision: 'accepted', note: '', ...SIGNATURE })
      .expect(403);
    const { body } = await reviewer.caller.get(`/revisions/${revisionId}`).expect(200);
    expect(body.decideRefusal).toMatch(/Only a reviewer/);
  });
});

describe('signing', () => {
  const accept = { decision: 'accepted', note: '', ...SIGNATURE };

  it('needs the password again and a capacity; a wrong password signs nothing', async () => {
    const { revisionId, reviewer } = await sentRevision(app);
    const url = `/revisions/${revisionId}/decision`;
    const wrong = await reviewer.caller.post(url, { ...accept, password: 'not my password' }).expect(400);
    expect(wrong.body.errors[0].path).toBe('password');
    await reviewer.caller.post(url, { ...accept, capacity: ' ' }).expect(400);
    expect(await app.db.query('SELECT 1 FROM decision WHERE revision_id = $1', [revisionId])).toEqual([]);
    const { body } = await reviewer.caller.post(url, accept).expect(201);
    expect(body.summary.decision).toMatchObject({
      signedName: 'Remi Okafor',
      capacity: 'Reviewing engineer',
      decidedAt: expect.stringMatching(/^\d{4}-/),
    });
    expect(JSON.stringify(await app.db.query('SELECT * FROM decision'))).not.toContain(SIGNATURE.password);
  });

  it('ends after too many wrong passwords, as signing in does', async () => {
    const { revisionId, reviewer } = await sentRevision(app);
    const url = `/revisions/${revisionId}/decision`;
    const statuses: number[] = [];
    for (let i = 0; i < 11; i += 1)
      statuses.push((await reviewer.caller.post(url, { ...accept, password: `guess ${i}` })).status);
    expect(statuses).toEqual([...Array(10).fill(400), 429]);
    expect((await reviewer.caller.post(url, accept)).status).toBe(429);
  });

  it('with notes needs the notes, and says so in the record and the mail', async () => {
    const { revisionId, reviewer, netId, caller, engineer } = await sentRevision(app);
    const url = `/revisions/${revisionId}/decision`;
    const withNotes = { ...accept, decision: 'acceptedWithNotes' };
    await reviewer.caller.post(url, withNotes).expect(400);
    const { body } = await reviewer.caller.post(url, { ...withNotes, note: 'Renew P2 in 2027.' }).expect(201);
    expect(body.summary).toMatchObject({
      state: 'acceptedWithNotes',
      decision: { note: 'Renew P2 in 2027.' },
    });
    expect((await openNet(caller, netId)).net.state).toBe('accepted');
    expect((await mailsFor(app, engineer.id))[0]?.subject).toMatch(/^Accepted with notes: /);
  });
});

describe('a wrong acceptance', () => {
  const withdrawal = { reason: 'The datum was wrong.', ...SIGNATURE };

  it('is corrected by a record of its own, by any reviewer who did not draw; the acceptance stays', async () => {
    const { revisionId, reviewer, netId, caller, damId, engineer } = await sentRevision(app);
    const url = `/revisions/${revisionId}/acceptance-withdrawals`;
    await reviewer.caller.post(url, withdrawal).expect(409);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(201);
    const other = await addRolePerson(app, damId, 'Lena Fogh', 'reviewer');
    await caller.post(url, withdrawal).expect(403);
    await other.caller.post(url, { ...withdrawal, reason: ' ' }).expect(400);
    await other.caller.post(url, { ...withdrawal, password: 'not mine at all' }).expect(400);
    const { body } = await other.caller.post(url, withdrawal).expect(201);
    expect(body.summary.state).toBe('acceptanceWithdrawn');
    expect(body.summary.decisions.map((each: { decision: string }) => each.decision)).toEqual([
      'accepted',
      'acceptanceWithdrawn',
    ]);
    await other.caller.post(url, withdrawal).expect(409);
    expect((await openNet(caller, netId)).net.state).toBe('returned');
    const subjects = (await mailsFor(app, engineer.id)).map((mail) => mail.subject);
    expect(subjects.at(-1)).toMatch(/^Acceptance withdrawn: /);
  });

  it('cannot be rewritten, neither through the API nor as the role the server works as', async () => {
    const { revisionId, reviewer } = await sentRevision(app);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(201);
    await reviewer.caller
      .post(`/revisions/${revisionId}/decision`, { ...accept, decision: 'returned', note: 'No.' })
      .expect(409);
    for (const sql of [
      "UPDATE decision SET decision = 'returned'",
      "UPDATE decision SET capacity = 'Another'",
      'DELETE FROM decision',
      'TRUNCATE decision',
      "UPDATE revision SET due_on = '2030-01-01'",
      "UPDATE revision SET reviewer_ids = '{}'",
    ])
      await expect(app.db.query(sql), sql).rejects.toThrow(/permission denied/);
    for (const method of ['patch', 'delete'] as const) {
      const { status } = await reviewer.caller[method](`/revisions/${revisionId}`, {});
      expect(status).toBe(404);
    }
  });
});

it('an accepted revision supersedes the accepted one before it, and both stay readable', async () => {
  const place = await sentRevision(app);
  const accept = { decision: 'accepted', note: '', ...SIGNATURE };
  await place.reviewer.caller.post(`/revisions/${place.revisionId}/decision`, accept).expect(201);
  await beginLine(place.caller, place.netId);
  const input = await sendInputFor(place, place.reviewer.person.id);
  await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
  const before = (await place.caller.get(`/revisions/${place.revisionId}`).expect(200)).body;
  expect(before.summary.supersededBy).toBeNull();
  await readyToDecide(place.reviewer.caller, input.id);
  await place.reviewer.caller.post(`/revisions/${input.id}/decision`, accept).expect(201);
  const after = (await place.caller.get(`/revisions/${place.revisionId}`).expect(200)).body;
  expect(after.summary).toMatchObject({ state: 'accepted', supersededBy: 'B' });
  expect(after.payload).toEqual(before.payload);
  const withdrawal = { reason: 'The datum was wrong.', ...SIGNATURE };
  await place.reviewer.caller.post(`/revisions/${input.id}/acceptance-withdrawals`, withdrawal).expect(201);
  const again = (await place.caller.get(`/revisions/${place.revisionId}`).expect(200)).body;
  expect(again.summary.supersededBy).toBeNull();
});
