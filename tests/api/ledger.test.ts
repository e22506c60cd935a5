import { createHash } from 'node:crypto';
import { Writable } from 'node:stream';
import { pino } from 'pino';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addFinishedNet, batchesOf, lineOf, openNet, put, putSingle } from '#tests/support/net-fixture.ts';
import { readyToDecide, reasonsFor, SIGNATURE } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { withDataSource } from '#tests/support/test-database.ts';
import { addMember } from '#tests/support/test-people.ts';

let app: TestApp;
const logged: string[] = [];
beforeAll(async () => {
  const sink = new Writable({
    write(chunk, _encoding, done) {
      logged.push(String(chunk));
      done();
    },
  });
  app = await createTestApp({ deps: { logger: pino({ level: 'error' }, sink) } });
});
afterAll(() => app.close());

/** A net with two revisions, A and B. */
async function twoRevisions() {
  const place = await addFinishedNet(app);
  const { person: reviewer, caller: checking } = await app.signIn('Remi Okafor');
  await addMember(app.db, place.damId, reviewer.id, 'reviewer');
  const send = async () => {
    const id = uuidv7();
    const { changeNumber } = await openNet(place.caller, place.netId);
    const input = {
      id,
      reviewerIds: [reviewer.id],
      message: '',
      changeNumber,
      reasons: await reasonsFor(place.caller, place.netId),
    };
    await place.caller.post(`/nets/${place.netId}/revisions`, input).expect(201);
    return id;
  };
  const first = await send();
  const unfinished = lineOf([[1, 1]], { finished: false });
  await place.caller.post(`/nets/${place.netId}/commands`, batchesOf()([put(unfinished)])).expect(200);
  const second = await send();
  await readyToDecide(checking, second);
  return { ...place, reviewer, checking, first, second };
}

const asOwner = (sql: string, parameters: unknown[]) =>
  withDataSource(app.database.ownerUrl, (db) => db.query(sql, parameters));

interface StoredRevision {
  payload: string;
  payload_hash: string;
  previous_hash: string | null;
}
const storedRevision = async (id: string): Promise<StoredRevision> =>
  (await app.db.query('SELECT payload, payload_hash, previous_hash FROM revision WHERE id = $1', [id]))[0];

describe('a frozen revision', () => {
  it('is canonical JSON whose SHA-256 is its hash, and names the hash before it', async () => {
    const { first, second } = await twoRevisions();
    const [a, b] = [await storedRevision(first), await storedRevision(second)];
    for (const row of [a, b]) {
      expect(createHash('sha256').update(row.payload).digest('hex')).toBe(row.payload_hash);
      // RFC 8785: members sorted, no white space between them.
      expect(row.payload).toMatch(/^\{"blindFirst":false,"dam":\{"datum":/);
    }
    expect(a.previous_hash).toBeNull();
    expect(b.previous_hash).toBe(a.payload_hash);
    expect(JSON.parse(b.payload).previousHash).toBe(a.payload_hash);
  });

  it('stays as it was when the net, the dam and the names of people change later', async () => {
    const { caller, netId, damId, second, engineer } = await twoRevisions();
    const before = (await caller.get(`/revisions/${second}`).expect(200)).body;
    const { document } = await openNet(caller, netId);
    await caller
      .post(`/nets/${netId}/commands`, batchesOf()([putSingle(document, 'waterLevels', { headwater: 3 })]))
      .expect(200);
    await caller.patch(`/nets/${netId}`, { name: 'Renamed' }).expect(200);
    await app.db.query("UPDATE dam SET name = 'Another' WHERE id = $1", [damId]);
    await app.db.query("UPDATE person SET name = 'Married Name' WHERE id = $1", [engineer.id]);
    const after = (await caller.get(`/revisions/${second}`).expect(200)).body;
    expect(after.payload).toEqual(before.payload);
    expect(after.summary.hash).toBe(before.summary.hash);
  });

  it('cannot be changed, removed or emptied by the role the server works as', async () => {
    const { first } = await twoRevisions();
    for (const sql of [
      "UPDATE revision SET payload = '{}' WHERE id = $1",
      'DELETE FROM revision WHERE id = $1',
      'DELETE FROM decision WHERE revision_id = $1',
      "UPDATE event SET text = '' WHERE id = $1",
    ])
      await expect(app.db.query(sql, [first]), sql).rejects.toThrow(/permission denied/);
    for (const table of ['revision', 'decision', 'artifact', 'event'])
      await expect(app.db.query(`TRUNCATE ${table}`), table).rejects.toThrow(/permission denied/);
    await expect(app.db.query('DROP TRIGGER revision_refuse_truncate ON revision')).rejects.toThrow(/owner/);
  });
});

describe('a revision that was tampered with by the owner of the database', () => {
  async function expectRefusedEverywhere(
    revisionId: string,
    place: Awaited<ReturnType<typeof twoRevisions>>,
  ) {
    logged.length = 0;
    const { body } = await place.caller.get(`/revisions/${revisionId}`).expect(500);
    expect(body.detail).toMatch(/not as it was frozen, so it is not shown/);
    expect(body.payload).toBeUndefined();
    expect(logged.join()).toContain(`Revision ${revisionId} of net ${place.netId} is damaged`);
    await place.checking
      .post(`/revisions/${revisionId}/decision`, { decision: 'accepted', note: '', ...SIGNATURE })
      .expect(500);
    expect(await app.db.query('SELECT 1 FROM decision WHERE revision_id = $1', [revisionId])).toEqual([]);
  }

  it('is not shown when a figure was altered', async () => {
    const place = await twoRevisions();
    const { payload } = await storedRevision(place.second);
    const altered = payload.replace(/"porePressure":\d/, '"porePressure":9');
    expect(altered).not.toBe(payload);
    await asOwner('UPDATE revision SET payload = $1 WHERE id = $2', [altered, place.second]);
    await expectRefusedEverywhere(place.second, place);
  });

  it('is not shown when the hash was made to fit and the chain betrays it', async () => {
    const place = await twoRevisions();
    const { payload } = await storedRevision(place.first);
    const altered = payload.replace(/"porePressure":\d/, '"porePressure":9');
    const hash = createHash('sha256').update(altered).digest('hex');
    await asOwner('UPDATE revision SET payload = $1, payload_hash = $2 WHERE id = $3', [
      altered,
      hash,
      place.first,
    ]);
    await expectRefusedEverywhere(place.second, place);
  });

  it.each([
    ['label', "label = 'C'"],
    ['reviewer', 'reviewer_id = sent_by'],
    ['drawers', "drawn_by = '{}'"],
    ['time of sending', "sent_at = sent_at - interval '1 day'"],
  ])('is not shown when the %s beside the payload was altered', async (_name, change) => {
    const place = await twoRevisions();
    await asOwner(`UPDATE revision SET ${change} WHERE id = $1`, [place.second]);
    await expectRefusedEverywhere(place.second, place);
  });

  it('is not shown when the revision before it was taken out', async () => {
    const place = await twoRevisions();
    // Its mail would keep it; whoever takes a revision out can take that out as well.
    await asOwner('DELETE FROM outbox_mail WHERE revision_id = $1', [place.first]);
    await asOwner('DELETE FROM revision WHERE id = $1', [place.first]);
    await expectRefusedEverywhere(place.second, place);
  });
});
