import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import type { AppDeps } from './app-deps.ts';
import type { AppConfig } from './config/config.ts';
import { createDataSource } from './entities/data-source.ts';
import { systemClock } from './http/clock.ts';
import type { JobsPort } from './jobs/jobs-port.ts';
import type { LivePort } from './live/live-port.ts';
import { createLocalDiskStorage } from './storage/local-disk-storage.ts';

const APP_ROLE = 'tracehead_app';

export interface Product {
  deps: AppDeps;
  /** Starts the live channel and the background workers. */
  startWork(): Promise<void>;
  /** Lets jobs finish within `graceMs`, then closes everything. */
  stop(graceMs: number): Promise<void>;
}

/** Makes the concrete adapters and hands them on: the one place where ports meet what is behind them. */
export async function compose(config: AppConfig, logger: Logger): Promise<Product> {
  const db = await connect(config);
  const jobs = noJobs();
  const live = liveInProcess();
  const storage = createLocalDiskStorage(config.storageDir);
  const deps: AppDeps = { config, db, storage, jobs, live, clock: systemClock, logger };
  return {
    deps,
    async startWork() {
      await live.start();
    },
    async stop(graceMs) {
      await jobs.stop(graceMs);
      await live.stop();
      await db.destroy();
    },
  };
}

/** With one login for both purposes the application's role is taken on connecting. */
function connect(config: AppConfig): Promise<DataSource> {
  const url = config.databaseAppUrl ?? config.databaseUrl ?? '';
  const role = config.databaseAppUrl ? {} : { role: APP_ROLE };
  return createDataSource({ url, ...role }).initialize();
}

function noJobs(): JobsPort {
  return { async enqueue() {}, async start() {}, async stop() {} };
}

function liveInProcess(): LivePort {
  return { async publish() {}, subscribe: () => () => {}, async start() {}, async stop() {} };
}
