import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { BlindView } from '#shared/contract/review.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import {
  addRolePerson,
  beginLine,
  mailsFor,
  SIGNATURE,
  sendInputFor,
  sentUnopened,
} from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { withDataSource } from '#tests/support/test-database.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

type Sent = Awaited<ReturnType<typeof sentUnopened>>;

const viewFor = async ({ reviewer, revisionId }: Sent): Promise<BlindView> => {
  const { body } = await reviewer.caller.get(`/revisions/${revisionId}/blind`).expect(200);
  return body.view;
};

/** The first point of the view as somebody reads it who counts a quarter of ten drops, 3 m above the datum. */
const readingOf = ({ points, levels }: BlindView) => ({
  drops: 10,
  outletHead: levels.tailwater ?? 0,
  points: [
    {
      pointId: points[0]?.id,
      sheetAt: null,
      offset: 1,
      elevation: -3,
      dropsLost: 2.5,
      totalHead: null,
      remark: 'Counted twice.',
    },
  ],
});

describe('the figures of a revision that a reviewer may still read blind', () => {
  it('are kept back by every route that tells them, until the reviewer opens them', async () => {
    const sent = await sentUnopened(app);
    const { netId, revisionId, reviewer, damId } = sent;
    const told = [
      `/revisions/${revisionId}`,
      `/revisions/${revisionId}/traces.dxf`,
      `/nets/${netId}`,
      `/nets/${netId}/schedule`,
      `/nets/${netId}/notes`,
      `/nets/${netId}/traces.dxf`,
      `/nets/${netId}/calculation-sheets`,
      `/dams/${damId}/seepage?nets=${netId}`,
    ];
    for (const address of told) {
      const { body } = await reviewer.caller.get(address).expect(409);
      expect(body, address).toMatchObject({ code: 'figures-kept-back', extra: { revisionId } });
    }
    const decision = { decision: 'returned', note: 'No.', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${revisionId}/decision`, decision).expect(409);
    // The list tells letters and states, no figure.
    await reviewer.caller.get(`/nets/${netId}/revisions`).expect(200);
    const dropsIn = async (caller: typeof sent.caller) => {
      const { body } = await caller.get(`/dams/${damId}/drawings`).expect(200);
      return body.items[0].sections[0].nets[0].drops;
    };
    expect(await dropsIn(sent.caller)).toBe(10);
    expect(await dropsIn(reviewer.caller)).toBeNull();
    await reviewer.caller.post(`/revisions/${revisionId}/figure-openings`).expect(201);
    for (const address of told) await reviewer.caller.get(address).expect(200);
    expect(await dropsIn(reviewer.caller)).toBe(10);
  });

  it('are not in what is shown meanwhile: lines, calibration and levels are', async () => {
    const sent = await sentUnopened(app);
    const { body } = await sent.caller.get(`/revisions/${sent.revisionId}`).expect(200);
    const { payload } = body as RevisionDto;
    const view = await viewFor(sent);
    const kinds = new Set(Object.values(view.document.entities).map(({ value }) => value.kind));
    expect([...kinds].sort()).toEqual([
      'knownPoint',
      'line',
      'netCount',
      'permeability',
      'setOut',
      'waterLevels',
    ]);
    const shown = JSON.stringify(view);
    for (const figure of ['porePressure', 'totalHead', 'dropsLost', '"seepage"', 'seepageFigures'])
      expect(shown, figure).not.toContain(figure);
    for (const { value } of Object.values(view.document.entities)) {
      if (value.kind === 'netCount') expect([value.drops, value.channels]).toEqual([null, null]);
      if (value.kind === 'permeability') expect(value.k).toBeNull();
      if (value.kind === 'line') expect([value.drops, value.name]).toEqual([null, '']);
    }
    expect(view.setOut).toEqual(JSON.parse(JSON.stringify(payload.reading.setOut)));
    expect(view.levels).toMatchObject({ headwater: expect.any(Number), gammaW: 9.81 });
    expect(view.points).toEqual(payload.reading.points.map(({ id, name }) => ({ id, name, at: null })));
  });

  it('are open to everybody else, and to who is sent an older revision', async () => {
    const sent = await sentUnopened(app);
    const other = await addRolePerson(app, sent.damId, 'Lena Fogh', 'reviewer');
    for (const caller of [sent.caller, other.caller]) {
      await caller.get(`/revisions/${sent.revisionId}`).expect(200);
      const { body } = await caller.get(`/revisions/${sent.revisionId}/blind`).expect(200);
      expect(body.view).toBeNull();
    }
    await beginLine(sent.caller, sent.netId);
    const again = await sendInputFor(sent, other.person.id);
    await sent.caller.post(`/nets/${sent.netId}/revisions`, again).expect(201);
    await sent.reviewer.caller.get(`/revisions/${sent.revisionId}`).expect(200);
    await other.caller.get(`/revisions/${again.id}`).expect(409);
  });

  it('are not told by the mail either when a blind reading was asked for', async () => {
    const asked = await sentUnopened(app, { blindFirst: true });
    const [mail] = await mailsFor(app, asked.reviewer.person.id);
    expect(mail?.text).not.toMatch(/kPa|Pore pressure/);
    expect(await viewFor(asked)).toMatchObject({ asked: true, figuresMailed: false });
    const offered = await sentUnopened(app);
    const [other] = await mailsFor(app, offered.reviewer.person.id);
    expect(other?.text).toContain('Pore pressure');
    expect(await viewFor(offered)).toMatchObject({ asked: false, figuresMailed: true });
  });
});

describe('a blind reading', () => {
  it('is sealed with head and pressure by the hand rule, and then stands beside the engineer’s', async () => {
    const sent = await sentUnopened(app, { blindFirst: true });
    const { revisionId, reviewer } = sent;
    const view = await viewFor(sent);
    const { headwater, tailwater } = view.levels;
    const input = readingOf(view);
    const { body } = await reviewer.caller.post(`/revisions/${revisionId}/blind-readings`, input).expect(201);
    const { review, summary } = body as RevisionDto;
    expect(review.openings).toEqual([]);
    const [sealed] = review.blindReadings;
    const head = (headwater ?? 0) - 0.25 * ((headwater ?? 0) - (tailwater ?? 0));
    expect(sealed).toMatchObject({ person: { name: 'Remi Okafor' } });
    expect(sealed?.reading).toMatchObject({
      placesShownAt: null,
      figuresMailed: false,
      drops: 10,
      headwater,
    });
    expect(sealed?.reading.points[0]).toMatchObject({ elevation: -3, remark: 'Counted twice.' });
    expect(sealed?.reading.points[0]?.totalHead).toBeCloseTo(head, 12);
    expect(sealed?.reading.points[0]?.porePressure).toBeCloseTo(9.81 * (head + 3), 10);
    const [row] = await app.db.query('SELECT * FROM review_record WHERE revision_id = $1', [revisionId]);
    expect(row).toMatchObject({ number: 1, kind: 'blindReading', previous_hash: summary.hash });
    // Others read it in the record.
    const seen = (await sent.caller.get(`/revisions/${revisionId}`).expect(200)).body as RevisionDto;
    expect(seen.review.blindReadings).toEqual(review.blindReadings);
  });

  it('is made once, and never by who has opened the figures; both are told in the record', async () => {
    const sent = await sentUnopened(app);
    const { revisionId, reviewer } = sent;
    const input = readingOf(await viewFor(sent));
    const url = `/revisions/${revisionId}/blind-readings`;
    const opened = await reviewer.caller.post(`/revisions/${revisionId}/figure-openings`).expect(201);
    expect(opened.body.review.openings).toMatchObject([{ person: { name: 'Remi Okafor' } }]);
    const { body } = await reviewer.caller.post(url, input).expect(409);
    expect(body.detail).toMatch(/cannot be read blind any more/);
    await reviewer.caller.post(`/revisions/${revisionId}/point-places`).expect(409);
    const again = await reviewer.caller.post(`/revisions/${revisionId}/figure-openings`).expect(201);
    expect(again.body.review.openings).toEqual(opened.body.review.openings);

    const other = await sentUnopened(app);
    const own = readingOf(await viewFor(other));
    const both = await Promise.all(
      [1, 2].map(() => other.reviewer.caller.post(`/revisions/${other.revisionId}/blind-readings`, own)),
    );
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
  });

  it('tells that the places of the points were asked for', async () => {
    const sent = await sentUnopened(app);
    const { revisionId, reviewer } = sent;
    const { body } = await reviewer.caller.post(`/revisions/${revisionId}/point-places`).expect(200);
    expect(body.view.placesShown).toBe(true);
    expect(body.view.points[0].at).toHaveLength(2);
    const sealed = await reviewer.caller
      .post(`/revisions/${revisionId}/blind-readings`, readingOf(body.view))
      .expect(201);
    expect(sealed.body.review.blindReadings[0].reading.placesShownAt).toMatch(/^\d{4}-/);
    const rows = await app.db.query(
      'SELECT number, previous_hash, payload_hash FROM review_record WHERE revision_id = $1 ORDER BY number',
      [revisionId],
    );
    expect(rows).toHaveLength(2);
    expect(rows[1].previous_hash).toBe(rows[0].payload_hash);
  });

  it('is refused with a reason for each point that is not read', async () => {
    const sent = await sentUnopened(app);
    const view = await viewFor(sent);
    const input = readingOf(view);
    const [point] = input.points;
    const url = `/revisions/${sent.revisionId}/blind-readings`;
    const refusal = async (change: object) =>
      (await sent.reviewer.caller.post(url, { ...input, ...change }).expect(400)).body.errors[0].message;
    expect(await refusal({ points: [] })).toBeDefined();
    expect(await refusal({ points: [{ ...point, totalHead: 4 }] })).toMatch(/one of the two/);
    expect(await refusal({ points: [{ ...point, dropsLost: null }] })).toMatch(/one of the two/);
    expect(await refusal({ drops: null })).toMatch(/drops of the whole net/);
    expect(await refusal({ outletHead: null })).toMatch(/enter the total head/);
    expect(await refusal({ points: [point, point] })).toMatch(/read twice/);
    expect(await refusal({ points: [{ ...point, pointId: sent.revisionId }] })).toMatch(
      /not in the revision/,
    );
    expect(await viewFor(sent)).not.toBeNull();
  });

  it('is for the reviewers of the revision, before it is decided', async () => {
    const sent = await sentUnopened(app);
    const input = readingOf(await viewFor(sent));
    const url = `/revisions/${sent.revisionId}/blind-readings`;
    const other = await addRolePerson(app, sent.damId, 'Lena Fogh', 'reviewer');
    await other.caller.post(url, input).expect(409);
    await sent.caller.post(url, input).expect(403);
    const reason = { reason: 'The tailwater was wrong.' };
    await sent.caller.post(`/revisions/${sent.revisionId}/sending-withdrawals`, reason).expect(201);
    await sent.reviewer.caller.post(url, input).expect(409);
    expect(await viewFor(sent)).toBeNull();
  });

  it('cannot be changed by the role the server works as, nor unseen by the owner of the database', async () => {
    const sent = await sentUnopened(app);
    const { revisionId, reviewer, caller } = sent;
    await reviewer.caller.post(`/revisions/${revisionId}/blind-readings`, readingOf(await viewFor(sent)));
    for (const sql of [
      "UPDATE review_record SET payload = '{}'",
      'DELETE FROM review_record',
      'TRUNCATE review_record',
    ])
      await expect(app.db.query(sql), sql).rejects.toThrow(/permission denied/);
    const asOwner = (sql: string) =>
      withDataSource(app.database.ownerUrl, (db) => db.query(sql, [revisionId]));
    await expect(
      withDataSource(app.database.ownerUrl, (db) => db.query('TRUNCATE review_record')),
    ).rejects.toThrow(/append-only/);
    await caller.get(`/revisions/${revisionId}`).expect(200);
    await asOwner(
      `UPDATE review_record SET payload = replace(payload, '"dropsLost":2.5', '"dropsLost":3.5') WHERE revision_id = $1`,
    );
    const { body } = await caller.get(`/revisions/${revisionId}`).expect(500);
    expect(body.detail).toMatch(/not as it was frozen/);
  });
});
