import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { pino } from 'pino';
import type { DataSource } from 'typeorm';
import { createApp } from '#server/app.ts';
import type { AppDeps } from '#server/app-deps.ts';
import { type AppConfig, readConfig } from '#server/config/config.ts';
import { createDataSource } from '#server/entities/data-source.ts';
import { type Clock, systemClock } from '#server/http/clock.ts';
import { createMemoryLive, type MemoryLive } from '#server/live/memory-live.ts';
import { createLocalDiskStorage } from '#server/storage/local-disk-storage.ts';
import { Caller } from './caller.ts';
import { createRecordingJobs, type RecordingJobs } from './recording-jobs.ts';
import { cloneDatabase, type TestDatabase } from './test-database.ts';
import { addPerson, type TestPerson } from './test-people.ts';

export interface TestAppOptions {
  config?: Partial<AppConfig>;
  clock?: Clock;
  /** Other ports than the recording ones, such as the real queue. */
  deps?: Partial<AppDeps>;
}

export interface TestApp {
  deps: AppDeps;
  /** The connection the application uses, with the application's role. */
  db: DataSource;
  database: TestDatabase;
  jobs: RecordingJobs;
  live: MemoryLive;
  storageDir: string;
  /** Where it listens, on a free port of this machine. */
  address: string;
  /** A browser without a sign-in. */
  caller(): Caller;
  /** A new person of this name, signed in through the API. */
  signIn(name: string, options?: { admin?: boolean }): Promise<{ person: TestPerson; caller: Caller }>;
  close(): Promise<void>;
}

/** The real application on a database of its own and a storage folder of its own. */
export async function createTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const database = await cloneDatabase();
  const storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-storage-'));
  const db = await createDataSource({ url: database.appUrl, poolSize: 8 }).initialize();
  const jobs = createRecordingJobs();
  const live = createMemoryLive();
  const deps: AppDeps = {
    config: { ...testConfig(database, storageDir), ...options.config },
    db,
    storage: createLocalDiskStorage(storageDir),
    jobs,
    live,
    clock: options.clock ?? systemClock,
    logger: pino({ level: process.env.LOG_LEVEL ?? 'silent' }),
    ...options.deps,
  };
  const server = await listen(createServer(createApp(deps)));
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  const caller = () => new Caller(address);
  return {
    deps,
    db,
    database,
    jobs,
    live,
    storageDir,
    address,
    caller,
    async signIn(name, { admin = false } = {}) {
      const person = await addPerson(db, name, { admin });
      const signedIn = caller();
      await signedIn.signIn(person.email, person.password);
      return { person, caller: signedIn };
    },
    async close() {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await db.destroy();
      await database.drop();
      rmSync(storageDir, { recursive: true, force: true });
    },
  };
}

function testConfig(database: TestDatabase, storageDir: string): AppConfig {
  return readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: database.ownerUrl,
    DATABASE_APP_URL: database.appUrl,
    STORAGE_DIR: storageDir,
    PUBLIC_URL: 'http://tracehead.test',
    MIN_FREE_BYTES: '0',
  });
}

function listen(server: Server): Promise<Server> {
  return new Promise((resolve) => {
    server.listen(0, '127.0.0.1', () => resolve(server));
  });
}
