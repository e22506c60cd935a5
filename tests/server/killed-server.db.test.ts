import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { CommandResult } from '#shared/contract/nets.ts';
import { Caller } from '#tests/support/caller.ts';
import { someoneWaits, until, whileHeld } from '#tests/support/held-steps.ts';
import { addNet, batchesOf, lineOf, type NetPlaceFixture, openNet, put } from '#tests/support/net-fixture.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { addPerson } from '#tests/support/test-people.ts';

let server: RealServer;
let place: NetPlaceFixture;
beforeAll(async () => {
  server = await startRealServer();
  place = await addNet({
    db: server.db,
    signIn: async (name) => {
      const person = await addPerson(server.db, name);
      const caller = new Caller(server.address);
      await caller.signIn(person.email, person.password);
      return { person, caller };
    },
  });
});
afterAll(() => server.close());

type Batch = ReturnType<ReturnType<typeof batchesOf>>;
const traced = (x: number) =>
  put(
    lineOf([
      [x, 0],
      [x, 10],
    ]),
  );
const send = (batch: Batch) => place.caller.post(`/nets/${place.netId}/commands`, batch);
const sent = async (batch: Batch) => (await send(batch).expect(200)).body as CommandResult;
const nothing = () => {};
const changeNumber = async () => (await openNet(place.caller, place.netId)).changeNumber;
async function linesKept(): Promise<string[]> {
  const rows: Array<{ entity_id: string }> = await server.db.query(
    "SELECT entity_id FROM document_entity WHERE net_id = $1 AND kind = 'line' AND NOT removed",
    [place.netId],
  );
  return rows.map((row) => row.entity_id).sort();
}
const idsOf = (of: Batch[]) => of.flatMap(({ ops }) => ops.map(({ entityId }) => entityId)).sort();

/** Holds the section, so that a batch sent meanwhile stands in the middle of its transaction. */
const whileSectionHeld = (work: (letGo: () => Promise<void>) => Promise<void>) =>
  whileHeld(server.db, `SELECT id FROM section WHERE id = '${place.sectionId}' FOR UPDATE`, work);

describe('a server that is killed in the middle of a batch', () => {
  const next = batchesOf();
  const batches = Array.from({ length: 12 }, (_, i) => next([traced(2 * i), traced(2 * i + 1)]));
  const acknowledged = batches.slice(0, 5);
  const unanswered = batches[5]!;
  const underWay = batches[6]!;
  let before: number;

  beforeAll(async () => {
    before = await changeNumber();
    for (const batch of acknowledged) await sent(batch);
    await whileSectionHeld(async (letGo) => {
      const sending = send(unanswered);
      sending.then(nothing, nothing);
      await until(() => someoneWaits(server.db));
      sending.abort();
      await letGo();
    });
    await until(async () => (await linesKept()).length === 12);
    await whileSectionHeld(async () => {
      const sending = send(underWay).then(nothing, nothing);
      await until(() => someoneWaits(server.db));
      await server.kill();
      await sending;
    });
    await server.restart();
  });

  it('has all that it acknowledged, and nothing of the batch that was under way', async () => {
    expect(await linesKept()).toEqual(idsOf([...acknowledged, unanswered]));
    expect(await changeNumber()).toBe(before + 6);
  });

  it('knows again what it had taken without answering, takes the rest, and all of it once', async () => {
    for (const batch of batches.slice(5)) {
      const answer = await sent(batch);
      expect(answer.outcomes.map(({ outcome, version }) => [outcome, version])).toEqual([
        ['applied', 1],
        ['applied', 1],
      ]);
      expect(await sent(batch)).toEqual(answer);
    }
    expect(await linesKept()).toEqual(idsOf(batches));
    expect(await changeNumber()).toBe(before + batches.length);
  });
});
