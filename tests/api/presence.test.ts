import { once } from 'node:events';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { pino } from 'pino';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '#server/app.ts';
import { createPgLive } from '#server/live/pg-live.ts';
import type { PresenceDto } from '#shared/contract/presence.ts';
import { Caller } from '#tests/support/caller.ts';
import { type LiveReader, openLiveReader } from '#tests/support/live-reader.ts';
import { addFinishedNet, type NetPlaceFixture } from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember, type TestPerson } from '#tests/support/test-people.ts';

let app: TestApp;
/** A second server process' application on the same database, with a live channel of its own. */
let otherAddress: string;
let closeOther: () => Promise<void>;
let place: NetPlaceFixture;
let remi: { person: TestPerson; caller: Caller };
let remiElsewhere: Caller;
const readers: LiveReader[] = [];

const pgLive = () => createPgLive({ url: app.database.appUrl, logger: pino({ level: 'silent' }) });

beforeAll(async () => {
  app = await createTestApp();
  app.deps.live = pgLive();
  await app.deps.live.start();
  const otherLive = pgLive();
  await otherLive.start();
  const server = createServer(createApp({ ...app.deps, live: otherLive })).listen(0, '127.0.0.1');
  await once(server, 'listening');
  otherAddress = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  closeOther = async () => {
    server.closeAllConnections();
    server.close();
    await otherLive.stop();
  };
  place = await addFinishedNet(app);
  remi = await app.signIn('Remi Okafor');
  await addMember(app.db, place.damId, remi.person.id, 'engineer');
  remiElsewhere = new Caller(otherAddress);
  await remiElsewhere.signIn(remi.person.email, remi.person.password);
});
afterEach(async () => {
  for (const reader of readers.splice(0)) reader.close();
  await app.db.query('DELETE FROM net_presence');
});
afterAll(async () => {
  await closeOther();
  await app.deps.live.stop();
  await app.close();
});

const path = (clientId?: string) =>
  `/nets/${place.netId}/presence${clientId === undefined ? '' : `/${clientId}`}`;
const beat = async (caller: Caller, clientId: string, tool = 'select', entityId: string | null = null) =>
  (await caller.put(path(clientId), { tool, entityId }).expect(200)).body as PresenceDto;
const names = async (caller: Caller) =>
  ((await caller.get(path()).expect(200)).body as PresenceDto).desks.map(({ person }) => person.name);
async function listen(address: string, caller: Caller): Promise<LiveReader> {
  const reader = await openLiveReader(address, caller.cookieHeader());
  readers.push(reader);
  await reader.until(() => reader.heard.length > 0);
  return reader;
}
const told = (reader: LiveReader) => reader.heard.filter(({ type }) => type === 'presence').length;

describe('who has a net open', () => {
  it('is nobody before the first sign of life', async () => {
    expect(await names(place.caller)).toEqual([]);
  });

  it('is told across server processes: who came, with what in hand, and who left', async () => {
    const [iris, here, lineId] = [uuidv7(), uuidv7(), uuidv7()];
    await beat(place.caller, iris);
    const reader = await listen(app.address, place.caller);
    const { desks } = await beat(remiElsewhere, here, 'equipotential', lineId);
    expect(desks.map(({ person, tool, entityId }) => [person.name, tool, entityId])).toEqual([
      [place.engineer.name, 'select', null],
      ['Remi Okafor', 'equipotential', lineId],
    ]);
    await reader.until(() => told(reader) === 1);
    expect(reader.heard.at(-1)).toEqual({ type: 'presence', damId: place.damId, netId: place.netId });
    await remiElsewhere.delete(path(here)).expect(204);
    await reader.until(() => told(reader) === 2);
    expect(await names(place.caller)).toEqual([place.engineer.name]);
  });

  it('is announced when something changed, and not at every sign of life', async () => {
    const desk = uuidv7();
    const reader = await listen(otherAddress, remiElsewhere);
    await beat(place.caller, desk);
    await beat(place.caller, desk);
    await beat(place.caller, desk, 'flowLine');
    await beat(place.caller, desk, 'flowLine');
    await place.caller.delete(path(desk)).expect(204);
    await reader.until(() => told(reader) === 3);
    // Leaving twice is nothing new.
    await place.caller.delete(path(desk)).expect(204);
    await beat(place.caller, desk);
    await reader.until(() => told(reader) === 4);
  });

  it('ends by itself when a desk gives no sign of life, and the next sign of another tells of it', async () => {
    const [gone, here] = [uuidv7(), uuidv7()];
    await beat(remi.caller, gone);
    await beat(place.caller, here);
    await app.db.query(
      "UPDATE net_presence SET seen_at = now() - interval '16 seconds' WHERE client_id = $1",
      [gone],
    );
    expect(await names(place.caller)).toEqual([place.engineer.name]);
    const reader = await listen(otherAddress, remiElsewhere);
    expect((await beat(place.caller, here)).desks).toHaveLength(1);
    await reader.until(() => told(reader) === 1);
    expect(await app.db.query('SELECT client_id FROM net_presence')).toEqual([{ client_id: here }]);
  });

  it('cannot be said or ended for somebody else', async () => {
    const desk = uuidv7();
    await beat(remi.caller, desk, 'flowLine');
    await beat(place.caller, desk, 'select');
    await place.caller.delete(path(desk)).expect(204);
    const { desks } = (await remi.caller.get(path()).expect(200)).body as PresenceDto;
    expect(desks.map(({ person, tool }) => [person.name, tool])).toEqual([['Remi Okafor', 'flowLine']]);
  });

  it('is nothing that the people of another dam hear of', async () => {
    const stranger = await app.signIn('Stranger');
    const elsewhere = await addDam(app.db, stranger.person.id);
    await addMember(app.db, elsewhere, stranger.person.id, 'engineer');
    await stranger.caller.get(path()).expect(404);
    await stranger.caller.put(path(uuidv7()), { tool: 'select', entityId: null }).expect(404);
    const reader = await listen(app.address, stranger.caller);
    await beat(place.caller, uuidv7());
    // What is about the listener comes after it, and is all that comes.
    await app.db.transaction((manager) =>
      app.deps.live.publish(manager, { type: 'person', personId: stranger.person.id }),
    );
    await reader.until(() => reader.heard.length === 2);
    expect(reader.heard[1]).toMatchObject({ type: 'person' });
  });
});
