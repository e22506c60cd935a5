import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openNet } from '#tests/support/net-fixture.ts';
import {
  addRolePerson,
  beginLine,
  mailsFor,
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
      .post(`/revisions/${revisionId}/decision`, { decision: 'returned', note: '  ' })
      .expect(400);
    expect(body.errors[0].path).toBe('note');
  });

  it('accepts once, and mails the sender and who drew', async () => {
    const { revisionId, reviewer, netId, caller, engineer } = await sentRevision(app);
    const accept = { decision: 'accepted', note: '' };
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
        reviewer.caller.post(`/revisions/${revisionId}/decision`, { decision, note: 'Seen.' }),
      ),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
  });

  it('returns with a note, after which a changed net is sent as the next letter, chained to the one before', async () => {
    const place = await sentRevision(app);
    const { revisionId, reviewer, netId, caller } = place;
    const back = { decision: 'returned', note: 'Line 3 is off.' };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, back).expect(201);
    expect((await openNet(caller, netId)).net.state).toBe('returned');
    await beginLine(caller, netId);
    expect((await openNet(caller, netId)).net.changedSinceRevision).toBe(true);
    const input = await sendInputFor(place, reviewer.person.id);
    const second = await caller.post(`/nets/${netId}/revisions`, input).expect(201);
    expect(second.body.label).toBe('B');
    const first = await reviewer.caller.get(`/revisions/${revisionId}`).expect(200);
    const opened = await reviewer.caller.get(`/revisions/${input.id}`).expect(200);
    expect(opened.body.payload.previousHash).toBe(first.body.summary.hash);
  });

  it('is refused to who drew, also when an engineer and reviewer in one person', async () => {
    const place = await sentRevision(app);
    const both = await addRolePerson(app, place.damId, 'Ada Both', 'engineer', 'reviewer');
    await beginLine(both.caller, place.netId);
    const input = await sendInputFor(place, place.reviewer.person.id);
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    const accept = { decision: 'accepted', note: '' };
    const { body } = await both.caller.post(`/revisions/${input.id}/decision`, accept).expect(403);
    expect(body.code).toBe('own-work');
    const seen = await both.caller.get(`/revisions/${input.id}`).expect(200);
    expect(seen.body.decideRefusal).toMatch(/another person has to check it/);
  });

  it('is refused to another reviewer, to an engineer, and on a revision that was followed by a later one', async () => {
    const place = await sentRevision(app);
    const accept = { decision: 'accepted', note: '' };
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
    const accept = { decision: 'accepted', note: '' };
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
      .post(`/revisions/${revisionId}/decision`, { decision: 'accepted', note: '' })
      .expect(403);
    const { body } = await reviewer.caller.get(`/revisions/${revisionId}`).expect(200);
    expect(body.decideRefusal).toMatch(/Only a reviewer/);
  });
});
