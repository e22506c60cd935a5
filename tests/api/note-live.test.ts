import { once } from 'node:events';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import { pino } from 'pino';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { createApp } from '#server/app.ts';
import { createPgLive } from '#server/live/pg-live.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { Caller } from '#tests/support/caller.ts';
import { type LiveReader, openLiveReader } from '#tests/support/live-reader.ts';
import { addNet, type NetPlaceFixture } from '#tests/support/net-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addMember, type TestPerson } from '#tests/support/test-people.ts';

/** What the product promises between a note and its being seen by everybody else on the net. */
const PROMISED_MS = 2000;

let app: TestApp;
/** A second server process' application on the same database, with a live channel of its own. */
let otherAddress: string;
let closeOther: () => Promise<void>;
let place: NetPlaceFixture;
let tove: { person: TestPerson; caller: Caller };
let toveElsewhere: Caller;
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
  place = await addNet(app);
  tove = await app.signIn('Tove Lind');
  await addMember(app.db, place.damId, tove.person.id, 'colleague');
  toveElsewhere = new Caller(otherAddress);
  await toveElsewhere.signIn(tove.person.email, tove.person.password);
});
afterEach(() => {
  for (const reader of readers.splice(0)) reader.close();
});
afterAll(async () => {
  await closeOther();
  await app.deps.live.stop();
  await app.close();
});

async function listenElsewhere(): Promise<LiveReader> {
  const reader = await openLiveReader(otherAddress, toveElsewhere.cookieHeader());
  readers.push(reader);
  await reader.until(() => reader.heard.length > 0);
  return reader;
}
const ofNotes = (reader: LiveReader) =>
  reader.heard.filter((event) => event.type === 'notes' && event.netId === place.netId);

async function write(text: string): Promise<string> {
  const note = { id: uuidv7(), anchor: { on: 'drawing' }, text };
  await place.caller.post(`/nets/${place.netId}/notes`, note).expect(201);
  return note.id;
}
const textsSeen = async (): Promise<string[]> =>
  (await toveElsewhere.get(`/nets/${place.netId}/notes`).expect(200)).body.items.map(
    (note: NoteDto) => note.entries[0]?.text,
  );

describe('notes between two server processes', () => {
  it('are told of within the time promised: a note, its answer, its state', async () => {
    const reader = await listenElsewhere();
    let id = '';
    const steps = [
      async () => {
        id = await write('First');
      },
      () => tove.caller.post(`/notes/${id}/answers`, { id: uuidv7(), text: 'Yes' }).expect(201),
      () => place.caller.post(`/notes/${id}/close`).expect(200),
    ];
    for (const [index, step] of steps.entries()) {
      await step();
      const answeredAt = performance.now();
      await reader.until(() => ofNotes(reader).length === index + 1);
      expect(performance.now() - answeredAt).toBeLessThan(PROMISED_MS);
    }
    expect((await toveElsewhere.get(`/nets/${place.netId}/notes`)).body.items[0]).toMatchObject({
      state: 'closed',
      answered: { by: { name: 'Tove Lind' } },
    });
  });

  it('are all there once each after the stream broke in the middle and was opened again', async () => {
    const before = await textsSeen();
    const first = await listenElsewhere();
    await write('Heard');
    await first.until(() => ofNotes(first).length === 1);
    first.close();
    await first.until(() => first.isEnded());
    await write('Missed');
    const second = await listenElsewhere();
    // The hello of the new stream is what makes a page ask again: nothing is missing then.
    expect(await textsSeen()).toEqual([...before, 'Heard', 'Missed']);
    await write('Heard again');
    await second.until(() => ofNotes(second).length === 1);
    expect(await textsSeen()).toEqual([...before, 'Heard', 'Missed', 'Heard again']);
    expect(ofNotes(second)).toHaveLength(1);
  });

  it('leave no gap for who follows while several write and the channel to the database breaks', async () => {
    const before = await textsSeen();
    const reader = await listenElsewhere();
    let seen: string[] = [];
    let asked = 0;
    let following = true;
    // As a page does: whatever is heard, the notes are asked for again.
    const follow = (async () => {
      while (following) {
        if (reader.heard.length > asked) {
          asked = reader.heard.length;
          seen = await textsSeen();
        }
        await delay(10);
      }
    })();
    await Promise.all([write('a'), write('b')]);
    await app.db.query(`SELECT pg_terminate_backend(pid) FROM pg_stat_activity
      WHERE application_name = 'tracehead-live' AND datname = current_database()`);
    await Promise.all([write('c'), write('d')]);
    await reader.until(() => reader.heard.filter((event) => event.type === 'hello').length === 2);
    await reader.until(() => asked === reader.heard.length && seen.length === before.length + 4);
    following = false;
    await follow;
    expect(seen.slice(before.length).sort()).toEqual(['a', 'b', 'c', 'd']);
  });

  it('tell what was read to the reader alone', async () => {
    const id = await write('To read');
    const reader = await listenElsewhere();
    const engineer = await openLiveReader(app.address, place.caller.cookieHeader());
    readers.push(engineer);
    await engineer.until(() => engineer.heard.length > 0);
    await tove.caller.put(`/notes/${id}/read`, { entries: 1 }).expect(200);
    await reader.until(() => reader.heard.some((event) => event.type === 'notesRead'));
    await write('After');
    await engineer.until(() => ofNotes(engineer).length === 1);
    expect(engineer.heard.some((event) => event.type === 'notesRead')).toBe(false);
  });
});
