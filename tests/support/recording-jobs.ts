import type { JobName, JobsPort } from '#server/jobs/jobs-port.ts';

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
