import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { besideFrozen } from '#shared/compute/compare-figures/run-again.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { FLOW_NET_VERSION } from '#shared/contract/document.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { firstDocument, firstReading } from '#tests/support/first-version/first-version.ts';
import { beginLine, SIGNATURE, sendInputFor, sentUnopened } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { withDataSource } from '#tests/support/test-database.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

/** A revision as the first version of the product froze it, with its hash. */
async function olderRevision(change: (reading: Record<string, unknown>) => object = (reading) => reading) {
  const place = await sentUnopened(app);
  const { payload } = (
    await app.db.query('SELECT payload FROM revision WHERE id = $1', [place.revisionId])
  )[0];
  const older = { document: firstDocument(), reading: change(firstReading()), engineVersion: '1' };
  const { stayedOpen: _notAskedThen, blindFirst: _norThat, ...asThen } = JSON.parse(payload);
  const text = canonicalize({ ...asThen, ...older })!;
  const hash = createHash('sha256').update(text).digest('hex');
  await withDataSource(app.database.ownerUrl, (db) =>
    db.query(
      "UPDATE revision SET payload = $1, payload_hash = $2, engine_version = '1', blind_first = NULL WHERE id = $3",
      [text, hash, place.revisionId],
    ),
  );
  return { ...place, hash };
}

it('a revision that holds less than a revision of its time is damaged and not shown', async () => {
  const { caller, revisionId } = await olderRevision(({ points: _lost, ...rest }) => rest);
  const { body } = await caller.get(`/revisions/${revisionId}`).expect(500);
  expect(body.detail).toMatch(/not as it was frozen/);
});

it('a revision frozen by the first version is shown with the figures that were frozen', async () => {
  const { caller, revisionId, hash } = await olderRevision();
  const { body } = await caller.get(`/revisions/${revisionId}`).expect(200);
  expect(body.summary.hash).toBe(hash);
  expect(body.payload.stayedOpen).toBeNull();
  expect(body.payload.engineVersion).toBe('1');
  expect(body.payload.reading).toMatchObject(firstReading());
  expect(body.payload.document).toMatchObject({ ...firstDocument(), version: FLOW_NET_VERSION });
});

it('a revision frozen by the first version is decided on, and the next one is chained to its hash', async () => {
  const place = await olderRevision();
  const { caller, netId, revisionId, reviewer, hash } = place;
  const back = { decision: 'returned', note: 'Line 3 is off.', ...SIGNATURE };
  await reviewer.caller.post(`/revisions/${revisionId}/decision`, back).expect(201);
  await beginLine(caller, netId);
  const input = await sendInputFor(place, reviewer.person.id);
  await caller.post(`/nets/${netId}/revisions`, input).expect(201);
  const { body } = await caller.get(`/revisions/${input.id}`).expect(200);
  expect(body.payload.previousHash).toBe(hash);
});

it('a revision frozen by the first version is run again by the present engine, and its record stays as it was', async () => {
  const { caller, netId, revisionId } = await olderRevision();
  const kept = () => app.db.query('SELECT * FROM revision WHERE net_id = $1', [netId]);
  const events = () => app.db.query('SELECT count(*) FROM event WHERE net_id = $1', [netId]);
  const [rows, told] = [await kept(), await events()];
  const { payload } = (await caller.get(`/revisions/${revisionId}`).expect(200)).body as RevisionDto;
  expect(payload.engineVersion).not.toBe(ENGINE_VERSION);
  // As the page does it: the frozen document read anew, nothing sent.
  const again = besideFrozen(payload.document, payload.reading, readNet(payload.document));
  expect(again.counts.differ).toBeGreaterThan(0);
  const heads = again.groups
    .filter(({ kind }) => kind === 'point')
    .map(({ figures }) => figures.find(({ what }) => what === 'totalHead')?.one.value);
  expect(heads).toEqual(firstReading().points.map(({ totalHead }) => totalHead));
  const after = (await caller.get(`/revisions/${revisionId}`).expect(200)).body as RevisionDto;
  expect(after.payload).toEqual(payload);
  expect(await kept()).toEqual(rows);
  expect(createHash('sha256').update(rows[0].payload).digest('hex')).toBe(after.summary.hash);
  expect(await events()).toEqual(told);
});
