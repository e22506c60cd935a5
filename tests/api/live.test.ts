import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import express from 'express';
import { pino } from 'pino';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { openLiveStream } from '#server/http/live-stream.ts';
import { mountRoutes } from '#server/http/mount-routes.ts';
import { defineRoute } from '#server/http/route-record.ts';
import { createSessionMiddleware } from '#server/http/session.ts';
import { configurePassport } from '#server/http/sign-in-strategy.ts';
import { createPgLive } from '#server/live/pg-live.ts';
import type { Caller } from '#tests/support/caller.ts';
import { type LiveReader, openLiveReader } from '#tests/support/live-reader.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember, type TestPerson } from '#tests/support/test-people.ts';

let app: TestApp;
let admin: Caller;
let ada: TestPerson;
const readers: LiveReader[] = [];

beforeAll(async () => {
  app = await createTestApp();
  // The real channel, so that what is heard has gone through the database.
  const live = createPgLive({ url: app.database.appUrl, logger: pino({ level: 'silent' }) });
  await live.start();
  app.deps.live = live;
  const signedIn = await app.signIn('Ada Quist', { admin: true });
  admin = signedIn.caller;
  ada = signedIn.person;
});
afterEach(() => {
  for (const reader of readers.splice(0)) reader.close();
});
afterAll(async () => {
  await app.deps.live.stop();
  await app.close();
});

async function listen(caller: Caller): Promise<LiveReader> {
  const reader = await openLiveReader(app.address, caller.cookieHeader());
  readers.push(reader);
  if (reader.status === 200) await reader.until(() => reader.heard.length > 0);
  return reader;
}
async function member(...roles: Array<'engineer' | 'reviewer' | 'colleague'>) {
  const damId = await addDam(app.db, ada.id);
  const { person, caller } = await app.signIn('Member');
  await addMember(app.db, damId, person.id, ...roles);
  return { damId, person, caller };
}

describe('the live stream', () => {
  it('is refused without a sign-in', async () => {
    const caller = app.caller();
    await caller.open();
    expect((await listen(caller)).status).toBe(401);
  });

  it('says hello and then what changes on the dams of the listener, and nothing of others', async () => {
    const mine = await member('colleague');
    const other = await member('engineer');
    const reader = await listen(mine.caller);
    expect(reader.contentType).toContain('text/event-stream');
    expect(reader.heard).toEqual([{ type: 'hello' }]);
    await admin.patch(`/dams/${other.damId}`, { name: 'Other Dam' }).expect(200);
    await admin.patch(`/dams/${mine.damId}`, { name: 'My Dam' }).expect(200);
    await reader.until(() => reader.heard.length === 2);
    expect(reader.heard[1]).toEqual({ type: 'dam', damId: mine.damId });
  });

  it('tells an administrator of every dam', async () => {
    const reader = await listen(admin);
    const { damId } = await member('engineer');
    await admin.patch(`/dams/${damId}`, { name: 'Some Dam' }).expect(200);
    await reader.until(() => reader.heard.some((event) => event.damId === damId));
  });

  it('begins with a dam when the listener is added to it, and stops when the part ends', async () => {
    const { caller, person } = await member('colleague');
    const { damId } = await member('engineer');
    const reader = await listen(caller);
    await admin.put(`/dams/${damId}/members/${person.id}`, { roles: ['colleague'] }).expect(200);
    await reader.until(() => reader.heard.some((event) => event.type === 'person'));
    await admin.patch(`/dams/${damId}`, { name: 'Joined' }).expect(200);
    await reader.until(() => reader.heard.some((event) => event.damId === damId));
    await admin.delete(`/dams/${damId}/members/${person.id}`).expect(204);
    await reader.until(() => reader.heard.filter((event) => event.type === 'person').length === 2);
    const before = reader.heard.length;
    await admin.patch(`/dams/${damId}`, { name: 'Left' }).expect(200);
    await admin.put(`/dams/${damId}/members/${person.id}`, { roles: ['reviewer'] }).expect(200);
    await reader.until(() => reader.heard.length > before);
    // The change in between was not passed on: the next thing heard is about the listener.
    expect(reader.heard[before]).toEqual({ type: 'person', personId: person.id });
    expect(reader.isEnded()).toBe(false);
  });

  it('ends at signing out, and for no other session of the person', async () => {
    const { caller, person } = await member('colleague');
    const phone = app.caller();
    await phone.signIn(person.email, person.password);
    const [here, there] = [await listen(caller), await listen(phone)];
    await caller.delete('/session').expect(200);
    await here.until(() => here.isEnded());
    expect(there.isEnded()).toBe(false);
  });

  it('ends when the person signs out everywhere or is deactivated', async () => {
    const { caller, person } = await member('colleague');
    const phone = app.caller();
    await phone.signIn(person.email, person.password);
    const there = await listen(phone);
    await caller.post('/session/end-all').expect(200);
    await there.until(() => there.isEnded());
    await phone.signIn(person.email, person.password);
    const again = await listen(phone);
    await admin.patch(`/people/${person.id}`, { active: false }).expect(200);
    await again.until(() => again.isEnded());
  });

  it('says hello again after the channel to the database broke', async () => {
    const { caller } = await member('colleague');
    const reader = await listen(caller);
    await app.db.query(`SELECT pg_terminate_backend(pid) FROM pg_stat_activity
      WHERE application_name = 'tracehead-live' AND datname = current_database()`);
    await reader.until(() => reader.heard.filter((event) => event.type === 'hello').length === 2);
  });

  it('ends at the next heartbeat when the session has run out meanwhile', async () => {
    const { caller, person } = await member('colleague');
    const quick = await startWithHeartbeat(100);
    const reader = await openLiveReader(quick.address, caller.cookieHeader());
    await reader.until(() => reader.heard.length > 0);
    await delay(300);
    expect(reader.isEnded()).toBe(false);
    await app.db.query(
      `UPDATE session SET expire = now() - interval '1 second' WHERE sess -> 'passport' ->> 'user' = $1`,
      [person.id],
    );
    await reader.until(() => reader.isEnded());
    await quick.close();
  });
});

/** The same stream on the same sessions, with a quicker pulse. */
async function startWithHeartbeat(heartbeatMs: number) {
  const route = defineRoute({
    method: 'get',
    path: '/api/v1/live',
    access: { who: 'signedIn' },
    handle: ({ deps, req, res, actor }) => openLiveStream(deps, req, res, actor, heartbeatMs),
  });
  const { deps } = app;
  const quick = express().use(
    createSessionMiddleware(deps),
    configurePassport(deps).session(),
    mountRoutes([route], deps),
  );
  const server = quick.listen(0, '127.0.0.1');
  await once(server, 'listening');
  return {
    address: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}
