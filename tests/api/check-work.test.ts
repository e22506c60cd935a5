import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { figuresToCheck } from '#shared/text/figures-to-check.ts';
import {
  addRolePerson,
  readyToDecide,
  SIGNATURE,
  sentRevision,
  sentUnopened,
} from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { withDataSource } from '#tests/support/test-database.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const accept = { decision: 'accepted', note: '', ...SIGNATURE };
type Caller = Awaited<ReturnType<typeof sentUnopened>>['caller'];

const opened = async (caller: Caller, revisionId: string): Promise<RevisionDto> =>
  (await caller.get(`/revisions/${revisionId}`).expect(200)).body;

/** The figures of a revision open to its reviewer, nothing ticked or answered. */
async function openedFigures() {
  const sent = await sentUnopened(app);
  const { body } = await sent.reviewer.caller.post(`/revisions/${sent.revisionId}/figure-openings`);
  const { payload } = body as RevisionDto;
  const figures = figuresToCheck(payload.document, payload.reading);
  return { ...sent, figures, draft: `/revisions/${sent.revisionId}/check-draft` };
}

describe('ticks', () => {
  it('are kept for each reviewer, changed one by one, and frozen with the decision', async () => {
    const { reviewer, revisionId, figures, draft } = await openedFigures();
    const [first, second, third] = figures.map(({ key }) => key);
    await reviewer.caller.patch(draft, { ticked: [first, second] }).expect(200);
    await reviewer.caller.patch(draft, { ticked: [third] }).expect(200);
    await reviewer.caller.patch(draft, { unticked: [second] }).expect(200);
    const { checking } = await opened(reviewer.caller, revisionId);
    expect([...(checking?.draft.ticks ?? [])].sort()).toEqual([first, third].sort());
    await readyToDecide(reviewer.caller, revisionId);
    const { body } = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(201);
    const [check] = (body as RevisionDto).review.checks;
    expect(check).toMatchObject({ decision: 'accepted', decisionId: body.summary.decision.id });
    expect(check?.check?.figures.map(({ key }) => key)).toEqual(figures.map(({ key }) => key));
    expect(check?.check?.figures.filter(({ ticked }) => ticked).map(({ key }) => key)).toEqual([
      first,
      third,
    ]);
    expect(body.checking).toBeNull();
    await reviewer.caller.patch(draft, { ticked: [second] }).expect(409);
  });

  it('cover schedule and title block, and are refused for what is no figure of the revision', async () => {
    const { reviewer, figures, draft } = await openedFigures();
    const parts = (part: string) => figures.filter((each) => each.part === part).length;
    expect(parts('schedule')).toBeGreaterThan(5);
    expect(parts('titleBlock')).toBe(9);
    expect(new Set(figures.map(({ key }) => key)).size).toBe(figures.length);
    await reviewer.caller.patch(draft, { ticked: ['point nobody elevation'] }).expect(400);
  });

  it('are for the reviewers of the revision, once its figures are open to them', async () => {
    const { draft, damId, caller, figures } = await openedFigures();
    const body = { ticked: [figures[0]?.key] };
    const other = await addRolePerson(app, damId, 'Lena Fogh', 'reviewer');
    await other.caller.patch(draft, body).expect(409);
    await caller.patch(draft, body).expect(403);
    const sent = await sentUnopened(app);
    await sent.reviewer.caller.patch(`/revisions/${sent.revisionId}/check-draft`, {}).expect(409);
  });
});

describe('the check list', () => {
  it('is answered before a revision is accepted, and need not be before it is returned', async () => {
    const { reviewer, revisionId, draft } = await openedFigures();
    const url = `/revisions/${revisionId}/decision`;
    const { checking } = await opened(reviewer.caller, revisionId);
    const items = checking?.checkList ?? [];
    expect(items.length).toBeGreaterThan(10);
    const gaps = await reviewer.caller.post(url, accept).expect(400);
    expect(gaps.body.errors).toHaveLength(items.length);
    expect(gaps.body.errors[0].message).toMatch(/Answer this before you accept/);
    expect(await app.db.query('SELECT 1 FROM decision WHERE revision_id = $1', [revisionId])).toEqual([]);
    const [first, ...rest] = items.map(({ id }) => id);
    const answers = rest.map((itemId) => ({ itemId, answer: 'notApplicable', remark: '' }));
    await reviewer.caller.patch(draft, { answers }).expect(200);
    await reviewer.caller
      .patch(draft, { answers: [{ itemId: first, answer: 'no', remark: '' }] })
      .expect(200);
    const bare = await reviewer.caller.post(url, accept).expect(400);
    expect(bare.body.errors[0].message).toMatch(/You answered no/);
    const said = { itemId: first, answer: 'no', remark: 'The drawing is the only one there is.' };
    await reviewer.caller.patch(draft, { answers: [said] }).expect(200);
    const { body } = await reviewer.caller.post(url, accept).expect(201);
    const { check } = (body as RevisionDto).review.checks[0] ?? {};
    expect(check?.checkList[0]).toEqual({ ...items[0], answer: 'no', remark: said.remark });

    const other = await openedFigures();
    const back = { decision: 'returned', note: 'Line 3 is off.', ...SIGNATURE };
    const returned = await other.reviewer.caller
      .post(`/revisions/${other.revisionId}/decision`, back)
      .expect(201);
    expect((returned.body as RevisionDto).review.checks[0]?.check?.checkList[0]?.answer).toBeNull();
  });

  it('is edited by who changes the dam’s settings; changed words have to be answered anew', async () => {
    const { reviewer, revisionId, draft, damId, caller } = await openedFigures();
    const url = `/dams/${damId}/check-list`;
    await reviewer.caller.put(url, { items: [] }).expect(403);
    const own = [
      { id: 'datum', text: 'The datum is named.' },
      { id: 'mine', text: 'The drain was seen to run.' },
    ];
    const { body } = await caller.put(url, { items: own }).expect(200);
    expect(body).toMatchObject({ isUsual: false, items: own.map(({ text }) => ({ text })) });
    const ids = body.items.map((item: { id: string }) => item.id);
    const yes = ids.map((itemId: string) => ({ itemId, answer: 'yes', remark: '' }));
    await reviewer.caller.patch(draft, { answers: yes }).expect(200);
    const changed = [body.items[0], { ...body.items[1], text: 'The drain was seen to run in 2026.' }];
    const saved = await caller.put(url, { items: changed }).expect(200);
    expect(saved.body.items[0].id).toBe(ids[0]);
    expect(saved.body.items[1].id).not.toBe(ids[1]);
    const gaps = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(400);
    expect(gaps.body.errors).toHaveLength(1);
    const events = await caller.get(`/dams/${damId}/events`).expect(200);
    expect(events.body.items.map((each: { text: string }) => each.text)).toContain(
      'changed the check list for reviewers',
    );
    await caller.put(url, { items: [changed[0], changed[0]] }).expect(400);
    const usual = await caller.put(url, { items: null }).expect(200);
    expect(usual.body.isUsual).toBe(true);
    expect((await reviewer.caller.get(url).expect(200)).body).toEqual(usual.body);
  });
});

describe('the record of a decision', () => {
  it('is chained, keeps the list as it stood, and betrays a decision that was altered', async () => {
    const { reviewer, revisionId, damId, caller } = await sentRevision(app);
    const { body } = await reviewer.caller.post(`/revisions/${revisionId}/decision`, accept).expect(201);
    const { checks } = (body as RevisionDto).review;
    const items = [{ id: uuidv7(), text: 'Something else.' }];
    await caller.put(`/dams/${damId}/check-list`, { items }).expect(200);
    expect((await opened(caller, revisionId)).review.checks).toEqual(checks);
    const rows = await app.db.query(
      'SELECT kind, previous_hash, payload_hash FROM review_record WHERE revision_id = $1 ORDER BY number',
      [revisionId],
    );
    expect(rows.map(({ kind }: { kind: string }) => kind)).toEqual(['figuresOpened', 'decision']);
    expect(rows[0].previous_hash).toBe(body.summary.hash);
    expect(rows[1].previous_hash).toBe(rows[0].payload_hash);
    await withDataSource(app.database.ownerUrl, (db) =>
      db.query("UPDATE decision SET capacity = 'Somebody else' WHERE revision_id = $1", [revisionId]),
    );
    await caller.get(`/revisions/${revisionId}`).expect(500);
  });
});
