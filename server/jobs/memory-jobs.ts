import type { EntityManager } from 'typeorm';
import { afterCommit } from '#server/entities/after-commit.ts';
import { JOB_NAMES, QUEUES, RETRY_DELAY_SECONDS, RETRY_LIMIT } from './job-names.ts';
import type { JobHandlers, JobName, JobsPort } from './jobs-port.ts';

interface Waiting {
  rowId: string;
  dueMs: number;
  failures: number;
}

export interface MemoryJobs extends JobsPort {
  /** Rows that wait for a worker, in the order they were asked for. */
  waiting(name: JobName): string[];
  /** Makes the next `enqueue` fail. */
  failNext(error: Error): void;
}

/** The queue in memory, with the same promises as the real one but for surviving the process. */
export function createMemoryJobs({ retryDelayMs = RETRY_DELAY_SECONDS * 1000 } = {}): MemoryJobs {
  const queues = new Map<JobName, Waiting[]>(JOB_NAMES.map((name) => [name, []]));
  const running = new Set<Promise<void>>();
  const busy = new Map<JobName, number>();
  const aborting = new AbortController();
  let handlers: JobHandlers | null = null;
  let stopped = false;
  let failure: Error | null = null;

  const queueOf = (name: JobName) => queues.get(name) ?? [];

  function put(name: JobName, job: Waiting): void {
    const queue = queueOf(name);
    const same = queue.find((each) => each.rowId === job.rowId);
    if (same) same.dueMs = Math.min(same.dueMs, job.dueMs);
    else queue.push(job);
    pump(name);
  }

  function pump(name: JobName): void {
    if (!handlers || stopped) return;
    const queue = queueOf(name);
    while ((busy.get(name) ?? 0) < QUEUES[name].concurrency) {
      const next = queue.findIndex((job) => job.dueMs <= Date.now());
      if (next < 0) break;
      const [job] = queue.splice(next, 1);
      if (job) run(name, job, handlers);
    }
    const soonest = Math.min(...queue.map((job) => job.dueMs));
    if (Number.isFinite(soonest)) setTimeout(() => pump(name), Math.max(5, soonest - Date.now())).unref();
  }

  function run(name: JobName, job: Waiting, { [name]: handler }: JobHandlers): void {
    busy.set(name, (busy.get(name) ?? 0) + 1);
    const work = handler(job.rowId, aborting.signal)
      .catch(() => {
        if (stopped || job.failures >= RETRY_LIMIT) return;
        const failures = job.failures + 1;
        put(name, { ...job, failures, dueMs: Date.now() + retryDelayMs * 2 ** job.failures });
      })
      .finally(() => {
        running.delete(work);
        busy.set(name, (busy.get(name) ?? 1) - 1);
        pump(name);
      });
    running.add(work);
  }

  return {
    waiting: (name) => queueOf(name).map((job) => job.rowId),
    failNext(error) {
      failure = error;
    },
    async enqueue(manager: EntityManager, name, rowId, afterSeconds = 0) {
      const thrown = failure;
      failure = null;
      if (thrown) throw thrown;
      const dueMs = Date.now() + afterSeconds * 1000;
      afterCommit(manager, () => put(name, { rowId, dueMs, failures: 0 }));
    },
    async start(given) {
      handlers = given;
      for (const name of JOB_NAMES) pump(name);
    },
    async stop(graceMs) {
      stopped = true;
      const timer = setTimeout(() => aborting.abort(), graceMs);
      await Promise.all(running);
      clearTimeout(timer);
    },
  };
}
