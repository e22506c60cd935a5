import { setTimeout as delay } from 'node:timers/promises';
import { pino } from 'pino';
import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createDataSource } from '#server/entities/data-source.ts';
import type { LivePort } from '#server/live/live-port.ts';
import { createMemoryLive } from '#server/live/memory-live.ts';
import { createPgLive } from '#server/live/pg-live.ts';
import type { LiveEvent } from '#shared/contract/live.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/test-database.ts';

const logger = pino({ level: process.env.LOG_LEVEL ?? 'silent' });
const adapters: Array<[string, (database: TestDatabase) => LivePort]> = [
  ['PostgreSQL', (database) => createPgLive({ url: database.appUrl, logger })],
  ['memory', () => createMemoryLive()],
];
const dam = (): LiveEvent => ({ type: 'dam', damId: crypto.randomUUID() });
const until = async (isTrue: () => boolean) => {
  const end = Date.now() + 10_000;
  while (!isTrue()) {
    if (Date.now() > end) throw new Error('It did not happen within 10 s.');
    await delay(10);
  }
};

describe.each(adapters)('announcements in %s', (_name, create) => {
  let database: TestDatabase;
  let db: DataSource;
  let live: LivePort;
  const heard: LiveEvent[] = [];

  beforeAll(async () => {
    database = await cloneDatabase();
    db = await createDataSource({ url: database.appUrl, poolSize: 2 }).initialize();
    live = create(database);
    await live.start();
    live.subscribe((event) => heard.push(event));
  });
  afterAll(async () => {
    await live.stop();
    await db.destroy();
    await database.drop();
  });

  it('are heard once the change is committed, in order, and not before', async () => {
    const [first, second] = [dam(), dam()];
    await db.transaction(async (manager) => {
      await live.publish(manager, first);
      await live.publish(manager, second);
      await delay(100);
      expect(heard).toEqual([]);
    });
    await until(() => heard.length === 2);
    expect(heard.splice(0)).toEqual([first, second]);
  });

  it('are not heard of a change that was taken back', async () => {
    const undone = db.transaction(async (manager) => {
      await live.publish(manager, dam());
      throw new Error('changed its mind');
    });
    await expect(undone).rejects.toThrow();
    const kept = dam();
    await live.publish(db.manager, kept);
    await until(() => heard.length > 0);
    expect(heard.splice(0)).toEqual([kept]);
  });

  it('are not heard any more by those who left', async () => {
    const left: LiveEvent[] = [];
    live.subscribe((event) => left.push(event))();
    await live.publish(db.manager, dam());
    await until(() => heard.length > 0);
    heard.splice(0);
    expect(left).toEqual([]);
  });
});

describe('announcements between processes', () => {
  it('reach each of them, and a broken connection is opened again and told as a gap', async () => {
    const database = await cloneDatabase();
    const db = await createDataSource({ url: database.appUrl, poolSize: 2 }).initialize();
    const one = createPgLive({ url: database.appUrl, logger });
    const other = createPgLive({ url: database.appUrl, logger });
    await Promise.all([one.start(), other.start()]);
    const heard: LiveEvent[] = [];
    let gaps = 0;
    other.subscribe(
      (event) => heard.push(event),
      () => gaps++,
    );
    const first = dam();
    await one.publish(db.manager, first);
    await until(() => heard.length === 1);
    await db.query(`SELECT pg_terminate_backend(pid) FROM pg_stat_activity
      WHERE application_name = 'tracehead-live' AND datname = current_database()`);
    await until(() => gaps === 1);
    const second = dam();
    await one.publish(db.manager, second);
    await until(() => heard.length === 2);
    expect(heard).toEqual([first, second]);
    await Promise.all([one.stop(), other.stop()]);
    await db.destroy();
    await database.drop();
  });
});
