import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PersonEntity } from '#server/entities/person-entity.ts';
import { remindReviewers } from '#server/services/review-reminders.ts';
import { inTransaction } from '#server/services/service-deps.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { netReading } from '#shared/contract/reading.ts';
import { addFinishedNet, addNet, openNet } from '#tests/support/net-fixture.ts';
import {
  addRolePerson,
  beginLine,
  mailsFor,
  readyToDecide,
  readyToSend,
  SIGNATURE,
  sendInputFor,
} from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

describe('before sending for checking', () => {
  it('an unfinished net says what stands in the way, and may not be sent', async () => {
    const place = await addNet(app);
    const reviewer = await addRolePerson(app, place.damId, 'Remi Okafor', 'reviewer');
    const { body } = await place.caller.get(`/nets/${place.netId}/sending`).expect(200);
    expect(body.refusal).toMatch(/unfinished/);
    expect(body.findings.length).toBeGreaterThan(0);
    const input = await sendInputFor(place, reviewer.person.id);
    const refused = await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(422);
    expect(refused.body.code).toBe('net-unfinished');
    expect(await mailsFor(app, reviewer.person.id)).toEqual([]);
  });

  it('the reviewers are named, those who drew among them, and the open notes counted', async () => {
    const { caller, netId, damId, reviewer } = await readyToSend(app);
    const both = await addRolePerson(app, damId, 'Ada Both', 'engineer', 'reviewer');
    await beginLine(both.caller, netId);
    const note = { id: uuidv7(), anchor: { on: 'place', at: [1, 1] }, text: 'Why?' };
    await reviewer.caller.post(`/nets/${netId}/notes`, note).expect(201);
    const { body } = await caller.get(`/nets/${netId}/sending`).expect(200);
    expect(body).toMatchObject({ findings: [], nextLabel: 'A' });
    expect(body.open).toContainEqual({ key: 'openNotes 1', about: 'notes', text: 'Note 1 is not closed.' });
    expect(
      body.reviewers.map((each: { person: { name: string }; drew: boolean }) => [
        each.person.name,
        each.drew,
      ]),
    ).toEqual([
      ['Ada Both', true],
      ['Remi Okafor', false],
    ]);
  });

  it('a reviewer who is deactivated or has not accepted the invitation is not offered', async () => {
    const { caller, netId, damId } = await addFinishedNet(app);
    const gone = await addRolePerson(app, damId, 'Gone Away', 'reviewer');
    const invited = await addRolePerson(app, damId, 'Not Yet', 'reviewer');
    await app.db.getRepository(PersonEntity).update({ id: gone.person.id }, { deactivatedAt: new Date() });
    await app.db.getRepository(PersonEntity).update({ id: invited.person.id }, { passwordHash: null });
    const { body } = await caller.get(`/nets/${netId}/sending`).expect(200);
    expect(body.reviewers).toEqual([]);
  });
});

describe('sending for checking', () => {
  it('freezes the net with its figures and tells the reviewer by mail', async () => {
    const place = await readyToSend(app);
    const { caller, netId, damId, engineer, reviewer } = place;
    const input = await sendInputFor(place, reviewer.person.id);
    app.live.published.length = 0;
    const { body } = await caller.post(`/nets/${netId}/revisions`, input).expect(201);
    expect(body).toMatchObject({
      id: input.id,
      label: 'A',
      decision: null,
      reviewer: { name: 'Remi Okafor' },
    });
    expect(body.hash).toMatch(/^[0-9a-f]{64}$/);
    expect(app.live.published).toEqual([{ type: 'revisions', damId, netId }]);

    await readyToDecide(reviewer.caller, input.id);
    const opened = (await reviewer.caller.get(`/revisions/${input.id}`).expect(200)).body;
    const { document } = await openNet(caller, netId);
    expect(opened.payload).toMatchObject({
      document,
      engineVersion: ENGINE_VERSION,
      message: 'Please look at line 3.',
      previousHash: null,
      drawnBy: [{ id: engineer.id }],
      dam: { name: 'Harrow Fen Dam' },
      drawing: { number: 'HF-114', revision: 'C' },
    });
    // JSON knows no −0, so the reading is compared as it was written.
    expect(opened.payload.reading).toEqual(JSON.parse(JSON.stringify(netReading.parse(readNet(document)))));
    expect(opened.decideRefusal).toBeNull();

    const [mail] = await mailsFor(app, reviewer.person.id);
    expect(mail?.subject).toBe(
      'For checking: Harrow Fen Dam, HF-114 rev C, Section B–B, chainage 212, revision A',
    );
    expect(mail?.text).toContain(`http://tracehead.test/revisions/${input.id}`);
    expect(mail?.text).toContain(`Hash of the record: ${opened.summary.hash}`);
    const [p1] = opened.payload.reading.points;
    // Units below their names: in one line it would be wider than a plain client shows.
    expect(mail?.text).toMatch(
      /Total head +Pore pressure\n +m local datum LD +m local datum LD +kPa\n +± at 95 % +± at 95 %\n/,
    );
    const pressure = `${p1.porePressure.toFixed(1)} ± ${p1.porePressurePlusMinus.toFixed(1)}`;
    expect(mail?.text.split('\n').find((line) => line.startsWith('P1 '))).toContain(pressure);
    expect(app.jobs.queued).toContainEqual({ name: 'send-mail', rowId: mail?.id, afterSeconds: 0 });
    const summary = (await openNet(caller, netId)).net;
    expect(summary).toMatchObject({ state: 'sent', revisionLabel: 'A', changedSinceRevision: false });
  });

  it('asks for a reason for each thing that stays open, and freezes the reasons with the net', async () => {
    const place = await readyToSend(app);
    const note = { id: uuidv7(), anchor: { on: 'place', at: [1, 1] }, text: 'Why?' };
    await place.caller.post(`/nets/${place.netId}/notes`, note).expect(201);
    const url = `/nets/${place.netId}/revisions`;
    const input = await sendInputFor(place, place.reviewer.person.id);
    const without = input.reasons.filter(({ key }) => key !== 'openNotes 1');
    expect(without).toHaveLength(input.reasons.length - 1);
    const { body } = await place.caller.post(url, { ...input, reasons: without }).expect(400);
    expect(body.errors).toEqual([
      {
        path: 'reasons.openNotes 1',
        message: 'Settle this, or give a reason why it stays: Note 1 is not closed.',
      },
    ]);
    const blank = input.reasons.map((each) => ({ ...each, reason: ' ' }));
    await place.caller.post(url, { ...input, reasons: blank }).expect(400);
    const gone = { key: 'no longer open', reason: 'Settled since.' };
    await place.caller.post(url, { ...input, reasons: [...input.reasons, gone] }).expect(201);
    const opened = (await place.caller.get(`/revisions/${input.id}`).expect(200)).body;
    expect(opened.payload.stayedOpen).toHaveLength(input.reasons.length);
    expect(opened.payload.stayedOpen).toContainEqual({
      key: 'openNotes 1',
      about: 'notes',
      text: 'Note 1 is not closed.',
      reason: 'Known to the office.',
    });
  });

  it('does it once when the same sending is repeated', async () => {
    const place = await readyToSend(app);
    const input = await sendInputFor(place, place.reviewer.person.id);
    const first = await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    const second = await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    expect(second.body).toEqual(first.body);
    expect(await mailsFor(app, place.reviewer.person.id)).toHaveLength(1);
  });

  it('gives one revision when two people send at the same moment', async () => {
    const place = await readyToSend(app);
    const other = await addRolePerson(app, place.damId, 'Sana Verma', 'engineer');
    const inputs = await Promise.all([1, 2].map(() => sendInputFor(place, place.reviewer.person.id)));
    const answers = await Promise.all(
      [place.caller, other.caller].map((caller, i) =>
        caller.post(`/nets/${place.netId}/revisions`, inputs[i]),
      ),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
    const { body } = await place.caller.get(`/nets/${place.netId}/revisions`).expect(200);
    expect(body.items).toHaveLength(1);
    expect(await mailsFor(app, place.reviewer.person.id)).toHaveLength(1);
  });

  it('is refused when the net was changed after the sender looked', async () => {
    const place = await readyToSend(app);
    const input = await sendInputFor(place, place.reviewer.person.id);
    await beginLine(place.caller, place.netId);
    const { body } = await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(409);
    expect(body).toMatchObject({ code: 'conflict', extra: { changeNumber: input.changeNumber + 1 } });
  });

  it('is refused to somebody who drew, to oneself, and to who is no reviewer', async () => {
    const place = await readyToSend(app);
    const both = await addRolePerson(app, place.damId, 'Ada Both', 'engineer', 'reviewer');
    const colleague = await addRolePerson(app, place.damId, 'Tove Lind', 'colleague');
    const toSelf = await sendInputFor(place, both.person.id);
    const self = await both.caller.post(`/nets/${place.netId}/revisions`, toSelf).expect(422);
    expect(self.body.code).toBe('own-work');
    await beginLine(both.caller, place.netId);
    const toDrawer = await sendInputFor(place, both.person.id);
    const drawer = await place.caller.post(`/nets/${place.netId}/revisions`, toDrawer).expect(422);
    expect(drawer.body.code).toBe('own-work');
    const toColleague = await sendInputFor(place, colleague.person.id);
    await place.caller.post(`/nets/${place.netId}/revisions`, toColleague).expect(400);
  });

  it('is not done a second time unchanged while the reviewer has it, but may go to another when that one has left', async () => {
    const place = await readyToSend(app);
    const { caller, netId, reviewer, damId } = place;
    await caller.post(`/nets/${netId}/revisions`, await sendInputFor(place, reviewer.person.id)).expect(201);
    const { body } = await caller.get(`/nets/${netId}/sending`).expect(200);
    expect(body).toMatchObject({
      nextLabel: 'B',
      refusal: expect.stringMatching(/Remi Okafor as revision A/),
    });
    await caller.post(`/nets/${netId}/revisions`, await sendInputFor(place, reviewer.person.id)).expect(409);
    const second = await addRolePerson(app, damId, 'Lena Fogh', 'reviewer');
    await app.db
      .getRepository(PersonEntity)
      .update({ id: reviewer.person.id }, { deactivatedAt: new Date() });
    const again = await caller
      .post(`/nets/${netId}/revisions`, await sendInputFor(place, second.person.id))
      .expect(201);
    expect(again.body.label).toBe('B');
  });

  it('leaves nothing behind when its mail cannot be queued', async () => {
    const place = await readyToSend(app);
    const input = await sendInputFor(place, place.reviewer.person.id);
    const { enqueue } = app.jobs;
    app.jobs.enqueue = async () => {
      throw new Error('The queue is away.');
    };
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(500);
    app.jobs.enqueue = enqueue;
    const { body } = await place.caller.get(`/nets/${place.netId}/revisions`).expect(200);
    expect(body.items).toEqual([]);
    expect(await mailsFor(app, place.reviewer.person.id)).toEqual([]);
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
  });

  it('is for engineers of the dam', async () => {
    const place = await readyToSend(app);
    const input = await sendInputFor(place, place.reviewer.person.id);
    await place.reviewer.caller.post(`/nets/${place.netId}/revisions`, input).expect(403);
    await place.reviewer.caller.get(`/nets/${place.netId}/sending`).expect(403);
  });
});

describe('several reviewers', () => {
  const accept = { decision: 'accepted', note: '', ...SIGNATURE };

  async function sentToTwo() {
    const place = await readyToSend(app);
    const second = await addRolePerson(app, place.damId, 'Lena Fogh', 'reviewer');
    const input = await sendInputFor(place, place.reviewer.person.id, second.person.id);
    const url = `/nets/${place.netId}/revisions`;
    const { body } = await place.caller.post(url, input).expect(201);
    expect(body.reviewers.map((each: { name: string }) => each.name)).toEqual(['Remi Okafor', 'Lena Fogh']);
    for (const { caller } of [place.reviewer, second]) await readyToDecide(caller, input.id);
    return { ...place, second, url: `/revisions/${input.id}/decision`, revisionId: input.id };
  }

  it('are all mailed, and the revision is accepted when each of them has accepted', async () => {
    const { reviewer, second, url, netId, caller } = await sentToTwo();
    expect(await mailsFor(app, second.person.id)).toHaveLength(1);
    const first = await reviewer.caller.post(url, accept).expect(201);
    expect(first.body.summary).toMatchObject({ state: 'waiting', decision: null });
    expect(first.body.decideRefusal).toMatch(/waits for the other reviewers/);
    await reviewer.caller.post(url, accept).expect(409);
    expect((await openNet(caller, netId)).net.state).toBe('sent');
    const last = await second.caller.post(url, accept).expect(201);
    expect(last.body.summary).toMatchObject({
      state: 'accepted',
      decision: { decidedBy: { name: 'Lena Fogh' } },
    });
    expect((await openNet(caller, netId)).net.state).toBe('accepted');
  });

  it('one of them returns it for all', async () => {
    const { reviewer, second, url } = await sentToTwo();
    await reviewer.caller.post(url, accept).expect(201);
    const back = { decision: 'returned', note: 'Line 3 is off.', ...SIGNATURE };
    const { body } = await second.caller.post(url, back).expect(201);
    expect(body.summary.state).toBe('returned');
  });

  it('are each named once, and there is at least one', async () => {
    const place = await readyToSend(app);
    const { id } = place.reviewer.person;
    const url = `/nets/${place.netId}/revisions`;
    await place.caller.post(url, await sendInputFor(place, id, id)).expect(400);
    await place.caller.post(url, await sendInputFor(place)).expect(400);
  });
});

describe('withdrawing a sending', () => {
  const reason = { reason: 'The tailwater was wrong.' };

  it('is a record of its own, mailed to the reviewers, after which nobody decides and the next letter is sent', async () => {
    const place = await readyToSend(app);
    const { caller, netId, reviewer } = place;
    const input = await sendInputFor(place, reviewer.person.id);
    await caller.post(`/nets/${netId}/revisions`, input).expect(201);
    const url = `/revisions/${input.id}/sending-withdrawals`;
    await reviewer.caller.post(url, reason).expect(403);
    await caller.post(url, { reason: ' ' }).expect(400);
    const { body } = await caller.post(url, reason).expect(201);
    expect(body.summary).toMatchObject({ state: 'withdrawn', decision: { note: reason.reason } });
    await caller.post(url, reason).expect(409);
    const accept = { decision: 'accepted', note: '', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${input.id}/decision`, accept).expect(409);
    const subjects = (await mailsFor(app, reviewer.person.id)).map((mail) => mail.subject);
    expect(subjects.at(-1)).toMatch(/^Withdrawn from checking: /);
    const again = await sendInputFor(place, reviewer.person.id);
    const sent = await caller.post(`/nets/${netId}/revisions`, again).expect(201);
    expect(sent.body.label).toBe('B');
  });

  it('is too late once it is decided', async () => {
    const place = await readyToSend(app);
    const input = await sendInputFor(place, place.reviewer.person.id);
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    const back = { decision: 'returned', note: 'Line 3 is off.', ...SIGNATURE };
    await readyToDecide(place.reviewer.caller, input.id);
    await place.reviewer.caller.post(`/revisions/${input.id}/decision`, back).expect(201);
    await place.caller.post(`/revisions/${input.id}/sending-withdrawals`, reason).expect(409);
  });
});

describe('the day by which a check is wanted', () => {
  /** A day from now, as an engineer types it. */
  const day = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);

  async function sentDue(dueOn: string) {
    const place = await readyToSend(app);
    const input = { ...(await sendInputFor(place, place.reviewer.person.id)), dueOn };
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    const reminders: Array<{ id: string; kind: string; at: Date }> = await app.db.query(
      'SELECT id, kind, at FROM review_reminder WHERE revision_id = $1 ORDER BY at',
      [input.id],
    );
    return { ...place, revisionId: input.id, reminders };
  }
  const remind = (id: string, at: Date) =>
    inTransaction({ ...app.deps, clock: { now: () => at } }, (tx) => remindReviewers(tx, id));
  const remindersFor = async (personId: string) =>
    (await mailsFor(app, personId)).filter(({ subject }) => /^(Due tomorrow|Overdue)/.test(subject));

  it('may not have passed, and is frozen with the revision', async () => {
    const place = await readyToSend(app);
    const input = await sendInputFor(place, place.reviewer.person.id);
    const url = `/nets/${place.netId}/revisions`;
    await place.caller.post(url, { ...input, dueOn: day(-3) }).expect(400);
    await place.caller.post(url, { ...input, dueOn: '2026-02-31' }).expect(400);
    await place.caller.post(url, { ...input, dueOn: day(9) }).expect(201);
    const { body } = await place.caller.get(`/revisions/${input.id}`).expect(200);
    expect([body.payload.dueOn, body.summary.dueOn]).toEqual([day(9), day(9)]);
  });

  it('is reminded of once on the day before and once when it has passed', async () => {
    const { reminders, reviewer } = await sentDue(day(9));
    expect(reminders.map(({ kind }) => kind)).toEqual(['dayBefore', 'overdue']);
    expect(app.jobs.queued).toContainEqual(
      expect.objectContaining({ name: 'remind-reviewers', rowId: reminders[0]?.id }),
    );
    for (const { id, at } of reminders) {
      await remind(id, new Date(at.getTime() - 1000));
      await remind(id, at);
      await Promise.all([remind(id, at), remind(id, at)]);
    }
    expect((await remindersFor(reviewer.person.id)).map(({ subject }) => subject.split(':')[0])).toEqual([
      'Due tomorrow for checking',
      'Overdue for checking',
    ]);
  });

  it('is not reminded of once the revision is decided', async () => {
    const { reminders, reviewer, revisionId } = await sentDue(day(9));
    const back = { decision: 'returned', note: 'Line 3 is off.', ...SIGNATURE };
    await readyToDecide(reviewer.caller, revisionId);
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, back).expect(201);
    for (const { id, at } of reminders) await remind(id, at);
    expect(await remindersFor(reviewer.person.id)).toEqual([]);
  });
});
