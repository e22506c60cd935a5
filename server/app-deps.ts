import type { Logger } from 'pino';
import type { DataSource } from 'typeorm';
import type { AppConfig } from '#server/config/config.ts';
import type { Clock } from '#server/http/clock.ts';
import type { JobsPort } from '#server/jobs/jobs-port.ts';
import type { LivePort } from '#server/live/live-port.ts';
import type { StoragePort } from '#server/storage/storage-port.ts';

/** Everything the application needs from outside; made in `main.ts` and in the tests' support, nowhere else. */
export interface AppDeps {
  config: AppConfig;
  db: DataSource;
  storage: StoragePort;
  jobs: JobsPort;
  live: LivePort;
  clock: Clock;
  logger: Logger;
}
