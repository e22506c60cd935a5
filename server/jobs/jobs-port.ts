import type { EntityManager } from 'typeorm';

/** Every job and what its id names. The rows named are the truth; the queue only wakes a worker. */
export interface JobIds {
  /** Row of `render_job`. */
  'render-drawing': string;
  /** Row of `outbox_mail`. */
  'send-mail': string;
  /** Row of `mail_digest`. */
  'send-digest': string;
  /** Row of `calculation_sheet`. */
  'make-calculation-sheet': string;
  /** Row of `rendition`. */
  'make-rendition': string;
  /** Row of `review_reminder`. */
  'remind-reviewers': string;
}
export type JobName = keyof JobIds;
/** Does the work of one row; idempotent, and stops soon after `signal` aborts. */
export type JobHandler = (rowId: string, signal: AbortSignal) => Promise<void>;
export type JobHandlers = { [Name in JobName]: JobHandler };

/** Background work. Queued in the transaction of the change that asks for it, so that neither exists alone. */
export interface JobsPort {
  /** Queues work on a row; a row already queued is not queued twice. `afterSeconds` delays a retry. */
  enqueue(manager: EntityManager, name: JobName, rowId: string, afterSeconds?: number): Promise<void>;
  /** Starts the workers; every name has exactly one handler. */
  start(handlers: JobHandlers): Promise<void>;
  /** Waits for what runs (up to `graceMs`, then aborts it) and stops. */
  stop(graceMs: number): Promise<void>;
}
