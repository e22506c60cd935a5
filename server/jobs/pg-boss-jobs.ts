import pg from 'pg';
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import type { EntityManager } from 'typeorm';
import { afterCommit } from '#server/entities/after-commit.ts';
import { type Bell, createBell } from './bell.ts';
import { JOB_NAMES, QUEUES, RETRY_DELAY_SECONDS, RETRY_LIMIT } from './job-names.ts';
import type { JobHandler, JobHandlers, JobName, JobsPort } from './jobs-port.ts';

const SCHEMA = 'pgboss';
/** How often work that another process asked for, or that was put off, is looked for; our own rings the bell. */
const POLL_MS = 500;

export interface PgBossJobsOptions {
  url: string;
  /** Role taken on connecting, where one login serves owner and application. */
  role?: string;
  logger: Logger;
}

interface Wake {
  rowId: string;
}

/**
 * Background work queued in PostgreSQL by pg-boss 10, in the transaction of the change that asks for it. The loop
 * over the queue is our own, because the package's neither waits for its own note that a job is done nor hands
 * over a signal to stop.
 */
export function createPgBossJobs({ url, role, logger }: PgBossJobsOptions): JobsPort {
  const connection = { connectionString: url, ...(role ? { options: `-c role=${role}` } : {}) };
  const pool = new pg.Pool({ ...connection, max: 4, application_name: 'tracehead-jobs' });
  pool.on('error', (error) => logger.warn({ err: error }, 'a connection of the job queue broke'));
  const boss = new PgBoss({
    db: { executeSql: (text, values) => pool.query(text, values) },
    schema: SCHEMA,
    schedule: false,
  });
  boss.on('error', (error) => logger.warn({ err: error }, 'job queue'));
  const stopping = new AbortController();
  const aborting = new AbortController();
  const loops: Promise<void>[] = [];
  const bells = Object.fromEntries(JOB_NAMES.map((name) => [name, createBell()])) as Record<JobName, Bell>;
  let opened: Promise<void> | undefined;

  /** Once for a process; tried again by the next caller when it failed. */
  const open = (): Promise<void> => {
    opened ??= openQueues(connection, boss).catch((error) => {
      opened = undefined;
      throw error;
    });
    return opened;
  };

  async function runOne(name: JobName, handler: JobHandler, job: PgBoss.Job<Wake>): Promise<void> {
    try {
      await handler(job.data.rowId, aborting.signal);
      await boss.complete(name, job.id);
    } catch (error) {
      if (!aborting.signal.aborted)
        logger.warn({ err: error, job: name, rowId: job.data.rowId }, 'a job failed and will be tried again');
      await boss.fail(name, job.id, { message: String(error) });
    }
  }

  async function loop(name: JobName, handler: JobHandler): Promise<void> {
    while (!stopping.signal.aborted) {
      try {
        const [job] = await boss.fetch<Wake>(name);
        if (job) {
          await runOne(name, handler, job);
          continue;
        }
      } catch (error) {
        // The database is away: the job stays active in the queue and the row's lease in our table runs out.
        logger.warn({ err: error, job: name }, 'the job queue did not answer');
      }
      await bells[name].heard(POLL_MS, stopping.signal);
    }
  }

  return {
    async enqueue(manager, name, rowId, afterSeconds = 0) {
      await open();
      await wake(boss, manager, name, rowId, afterSeconds);
      if (afterSeconds === 0) afterCommit(manager, () => bells[name].ring());
    },
    async start(handlers: JobHandlers) {
      await open();
      for (const name of JOB_NAMES)
        for (let n = 0; n < QUEUES[name].concurrency; n++) loops.push(loop(name, handlers[name]));
    },
    async stop(graceMs) {
      stopping.abort();
      const timer = setTimeout(() => aborting.abort(), graceMs);
      await Promise.all(loops);
      clearTimeout(timer);
      if (opened) await boss.stop({ graceful: false });
      await pool.end();
    },
  };
}

/**
 * Makes the queue's tables when they are missing, and every queue before anything is sent to it. One process at a
 * time, under a lock that ends with its connection: two that make queues at once deadlock (tried).
 */
async function openQueues(connection: pg.ClientConfig, boss: PgBoss): Promise<void> {
  const client = new pg.Client(connection);
  await client.connect();
  try {
    await client.query(`SELECT pg_advisory_lock(hashtext('tracehead job queues'))`);
    await installSchema(client);
    await boss.start();
    await defineQueues(boss);
  } finally {
    await client.end();
  }
}

/**
 * The package would begin with CREATE SCHEMA IF NOT EXISTS, which asks for rights on the whole database even when
 * the schema is there; the migrations have made it.
 */
async function installSchema(client: pg.Client): Promise<void> {
  const { rows } = await client.query(`SELECT to_regclass('${SCHEMA}.version') AS installed`);
  if (rows[0].installed) return;
  await client.query(PgBoss.getConstructionPlans(SCHEMA).replace(/CREATE SCHEMA IF NOT EXISTS \w+\s*;/, ''));
}

async function defineQueues(boss: PgBoss): Promise<void> {
  const known = new Set((await boss.getQueues()).map((queue) => queue.name));
  for (const name of JOB_NAMES) {
    const rules = {
      name,
      // Only this policy heeds the singleton key: at most one job waits for a row.
      policy: 'short' as const,
      expireInSeconds: QUEUES[name].expireInSeconds,
      retryLimit: RETRY_LIMIT,
      retryDelay: RETRY_DELAY_SECONDS,
      retryBackoff: true,
    };
    await (known.has(name) ? boss.updateQueue(name, rules) : boss.createQueue(name, rules));
  }
}

/** Sends, or hastens what already waits for the same row. */
async function wake(
  boss: PgBoss,
  manager: EntityManager,
  name: JobName,
  rowId: string,
  afterSeconds: number,
): Promise<void> {
  const db = inTransactionOf(manager);
  const startAfter = Math.max(0, Math.ceil(afterSeconds));
  for (let attempt = 0; attempt < 5; attempt++) {
    const sent = await boss.send(name, { rowId } satisfies Wake, { singletonKey: rowId, startAfter, db });
    if (sent) return;
    // One is waiting. Locked by this update it is not started before this transaction's rows can be seen; when it
    // has been started meanwhile nothing is updated, and another one is sent.
    const { rows } = await db.executeSql(
      `UPDATE ${SCHEMA}.job SET start_after = LEAST(start_after, now() + $3 * interval '1 second')
        WHERE name = $1 AND singleton_key = $2 AND state = 'created' RETURNING id`,
      [name, rowId, startAfter],
    );
    if (rows.length > 0) return;
  }
  throw new Error(`The job ${name} of row ${rowId} could not be queued.`);
}

/** Lets the package write through a TypeORM manager, in its transaction. */
function inTransactionOf(manager: EntityManager): PgBoss.Db {
  return {
    async executeSql(text, values) {
      const own = manager.queryRunner;
      const runner = own ?? manager.connection.createQueryRunner();
      try {
        const result = await runner.query(text, values, true);
        return { rows: result.records };
      } finally {
        if (!own) await runner.release();
      }
    },
  };
}
