import type { JobName, JobsPort } from '#server/jobs/jobs-port.ts';
import type { LivePort } from '#server/live/live-port.ts';
import type { LiveEvent } from '#shared/contract/live.ts';

export interface RecordingJobs extends JobsPort {
  /** What was queued, in order. */
  queued: Array<{ name: JobName; rowId: string; afterSeconds: number }>;
}

/** Notes what is queued and runs nothing, for tests about requests rather than about work. */
export function createRecordingJobs(): RecordingJobs {
  const queued: RecordingJobs['queued'] = [];
  return {
    queued,
    async enqueue(_manager, name, rowId, afterSeconds = 0) {
      queued.push({ name, rowId, afterSeconds });
    },
    async start() {},
    async stop() {},
  };
}

export interface RecordingLive extends LivePort {
  /** What was announced, in order. */
  published: LiveEvent[];
}

/** Notes what is announced and tells it to listeners of the same process at once. */
export function createRecordingLive(): RecordingLive {
  const published: LiveEvent[] = [];
  const listeners = new Set<(event: LiveEvent) => void>();
  return {
    published,
    async publish(_manager, event) {
      published.push(event);
      for (const listener of listeners) listener(event);
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    async start() {},
    async stop() {},
  };
}
