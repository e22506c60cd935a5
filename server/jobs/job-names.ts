import type { JobName } from './jobs-port.ts';

export interface QueueRules {
  /** Jobs of this queue that one process works on at once. */
  concurrency: number;
  /** Seconds after which the queue believes a job dead; longer than the longest honest run. */
  expireInSeconds: number;
}

/** Every queue. What a job names is a row of ours, which is the truth; the queue only wakes a worker. */
export const QUEUES: Record<JobName, QueueRules> = {
  // One page may take three minutes and a file may have hundreds; two at once would share two cores to no end.
  'render-drawing': { concurrency: 1, expireInSeconds: 20 * 60 * 60 },
  'send-mail': { concurrency: 2, expireInSeconds: 10 * 60 },
  'send-digest': { concurrency: 1, expireInSeconds: 10 * 60 },
  'make-calculation-sheet': { concurrency: 1, expireInSeconds: 10 * 60 },
  'make-rendition': { concurrency: 1, expireInSeconds: 20 * 60 },
  'remind-reviewers': { concurrency: 1, expireInSeconds: 10 * 60 },
};
export const JOB_NAMES = Object.keys(QUEUES) as JobName[];

/** Tries again after a handler threw: the first after this many seconds, then twice as long each time. */
export const RETRY_DELAY_SECONDS = 2;
export const RETRY_LIMIT = 8;
