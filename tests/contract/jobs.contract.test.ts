import { setTimeout as delay } from 'node:timers/promises';
import { pino } from 'pino';
import type { DataSource } from 'typeorm';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { createDataSource } from '#server/entities/data-source.ts';
import type { JobHandler, JobHandlers, JobsPort } from '#server/jobs/jobs-port.ts';
import { createMemoryJobs } from '#server/jobs/memory-jobs.ts';
import { createPgBossJobs } from '#server/jobs/pg-boss-jobs.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/test-database.ts';

const logger = pino({ level: process.env.LOG_LEVEL ?? 'silent' });
const adapters: Array<[string, (database: TestDatabase) => JobsPort]> = [
  ['pg-boss', (database) => createPgBossJobs({ url: database.appUrl, logger })],
  ['memory', () => createMemoryJobs({ retryDelayMs: 100 })],
];

describe.each(adapters)('background work in %s', (_name, create) => {
  let database: TestDatabase;
  let db: DataSource;
  const started: JobsPort[] = [];

  beforeAll(async () => {
    database = await cloneDatabase();
    db = await createDataSource({ url: database.appUrl, poolSize: 4 }).initialize();
  });
  afterEach(async () => {
    for (const jobs of started.splice(0)) await jobs.stop(0);
  });
  afterAll(async () => {
    await db.destroy();
    await database.drop();
  });

  function make(): JobsPort {
    const jobs = create(database);
    started.push(jobs);
    return jobs;
  }
  const nothing: JobHandler = async () => {};
  const handlersWith = (send: JobHandler): JobHandlers => ({
    'render-drawing': nothing,
    'send-mail': send,
    'make-calculation-sheet': nothing,
    'make-rendition': nothing,
    'remind-reviewers': nothing,
    'send-digest': nothing,
  });
  const rowId = () => crypto.randomUUID();
  const until = async (isTrue: () => boolean) => {
    const end = Date.now() + 15_000;
    while (!isTrue()) {
      if (Date.now() > end) throw new Error('It did not happen within 15 s.');
      await delay(20);
    }
  };

  it('runs a row once its transaction is committed, and not before', async () => {
    const jobs = make();
    const ran: string[] = [];
    await jobs.start(
      handlersWith(async (id) => {
        ran.push(id);
      }),
    );
    const row = rowId();
    await db.transaction(async (manager) => {
      await jobs.enqueue(manager, 'send-mail', row);
      await delay(1200);
      expect(ran).toEqual([]);
    });
    await until(() => ran.length > 0);
    await delay(700);
    expect(ran).toEqual([row]);
  });

  it('forgets what a rolled-back transaction asked for', async () => {
    const jobs = make();
    const ran: string[] = [];
    await jobs.start(
      handlersWith(async (id) => {
        ran.push(id);
      }),
    );
    const undone = db.transaction(async (manager) => {
      await jobs.enqueue(manager, 'send-mail', rowId());
      throw new Error('changed its mind');
    });
    await expect(undone).rejects.toThrow('changed its mind');
    const kept = rowId();
    await jobs.enqueue(db.manager, 'send-mail', kept);
    await until(() => ran.length > 0);
    expect(ran).toEqual([kept]);
  });

  it('queues a row that waits already only once, and hastens it', async () => {
    const jobs = make();
    const row = rowId();
    const ran: string[] = [];
    await jobs.enqueue(db.manager, 'send-mail', row, 3600);
    await jobs.enqueue(db.manager, 'send-mail', row, 7200);
    await jobs.enqueue(db.manager, 'send-mail', row);
    await jobs.start(
      handlersWith(async (id) => {
        ran.push(id);
      }),
    );
    await until(() => ran.length > 0);
    await delay(1200);
    expect(ran).toEqual([row]);
  });

  it('runs a row again that is queued while it runs', async () => {
    const jobs = make();
    const row = rowId();
    let runs = 0;
    await jobs.start(
      handlersWith(async (id) => {
        if (runs++ === 0) await jobs.enqueue(db.manager, 'send-mail', id);
      }),
    );
    await jobs.enqueue(db.manager, 'send-mail', row);
    await until(() => runs === 2);
  });

  it('waits the seconds it is told', async () => {
    const jobs = make();
    let ranAt = 0;
    await jobs.start(
      handlersWith(async () => {
        ranAt = Date.now();
      }),
    );
    const asked = Date.now();
    await jobs.enqueue(db.manager, 'send-mail', rowId(), 2);
    await until(() => ranAt > 0);
    expect(ranAt - asked).toBeGreaterThan(1900);
  });

  it('tries again what threw', async () => {
    const jobs = make();
    let runs = 0;
    await jobs.start(
      handlersWith(async () => {
        if (++runs === 1) throw new Error('not this time');
      }),
    );
    await jobs.enqueue(db.manager, 'send-mail', rowId());
    await until(() => runs === 2);
  });

  it('goes to the handler of its own name', async () => {
    const jobs = make();
    const ran: string[] = [];
    const note = (name: string) => async () => {
      ran.push(name);
    };
    await jobs.start({
      'render-drawing': note('render'),
      'send-mail': note('mail'),
      'make-calculation-sheet': note('sheet'),
      'make-rendition': note('rendition'),
      'remind-reviewers': note('reminder'),
      'send-digest': note('digest'),
    });
    await jobs.enqueue(db.manager, 'render-drawing', rowId());
    await until(() => ran.length > 0);
    expect(ran).toEqual(['render']);
  });

  it('lets what runs finish when it stops, and starts nothing more', async () => {
    const jobs = make();
    let finished = false;
    let begun = false;
    await jobs.start(
      handlersWith(async () => {
        begun = true;
        await delay(800);
        finished = true;
      }),
    );
    await jobs.enqueue(db.manager, 'send-mail', rowId());
    await until(() => begun);
    await started.pop()?.stop(10_000);
    expect(finished).toBe(true);
  });

  it('aborts what runs longer than the grace', async () => {
    const jobs = make();
    let begun = false;
    await jobs.start(
      handlersWith(async (_id, signal) => {
        begun = true;
        await delay(60_000, undefined, { signal });
      }),
    );
    await jobs.enqueue(db.manager, 'send-mail', rowId());
    await until(() => begun);
    const asked = Date.now();
    await started.pop()?.stop(300);
    expect(Date.now() - asked).toBeLessThan(5000);
  });
});

describe('the queue in PostgreSQL', () => {
  it('is opened by several processes at once, and keeps what waits when they end', async () => {
    const database = await cloneDatabase();
    const db = await createDataSource({ url: database.appUrl, poolSize: 4 }).initialize();
    const processes = [1, 2, 3].map(() => createPgBossJobs({ url: database.appUrl, logger }));
    const rows = processes.map(() => crypto.randomUUID());
    await Promise.all(processes.map((jobs, n) => jobs.enqueue(db.manager, 'send-mail', rows[n] as string)));
    await Promise.all(processes.map((jobs) => jobs.stop(0)));
    const later = createPgBossJobs({ url: database.appUrl, logger });
    const ran: string[] = [];
    await later.start({
      'render-drawing': async () => {},
      'make-calculation-sheet': async () => {},
      'make-rendition': async () => {},
      'remind-reviewers': async () => {},
      'send-digest': async () => {},
      'send-mail': async (id) => {
        ran.push(id);
      },
    });
    for (let n = 0; n < 100 && ran.length < 3; n++) await delay(100);
    expect(ran.sort()).toEqual(rows.sort());
    await later.stop(1000);
    await db.destroy();
    await database.drop();
  });
});

describe('the queue in memory', () => {
  it('fails once when told to and shows what waits', async () => {
    const database = await cloneDatabase();
    const db = await createDataSource({ url: database.appUrl, poolSize: 1 }).initialize();
    const jobs = createMemoryJobs();
    jobs.failNext(new Error('no room'));
    await expect(jobs.enqueue(db.manager, 'send-mail', 'a')).rejects.toThrow('no room');
    await jobs.enqueue(db.manager, 'send-mail', 'b');
    expect(jobs.waiting('send-mail')).toEqual(['b']);
    await db.destroy();
    await database.drop();
  });
});
