import { once } from 'node:events';
import { Worker } from 'node:worker_threads';
import { unprocessable } from '#server/errors/app-error.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Threads at most; each holds a core while it reads. */
const MOST_THREADS = 2;
/** A net of 12,000 vertices is read in a tenth of a second: what takes this long is a tangle, not a net. */
const READING_MS = 8_000;

const threadFile = new URL('./reading-thread-start.mjs', import.meta.url);

interface Job {
  document: FlowNetDocument;
  limitMs: number;
  resolve(reading: NetReading): void;
  reject(error: unknown): void;
}

const waiting: Job[] = [];
const idle: Worker[] = [];
let running = 0;

/**
 * Reads a net in a thread of its own, so that no net keeps the server from answering everybody else.
 * @throws AppError net-unfinished when it takes longer than any net that makes sense
 */
export function readInThread(document: FlowNetDocument, limitMs = READING_MS): Promise<NetReading> {
  return new Promise((resolve, reject) => {
    waiting.push({ document, limitMs, resolve, reject });
    startNext();
  });
}

function startNext(): void {
  if (running >= MOST_THREADS) return;
  const job = waiting.shift();
  if (!job) return;
  running += 1;
  void work(job).finally(() => {
    running -= 1;
    startNext();
  });
}

async function work(job: Job): Promise<void> {
  let thread: Worker | null = null;
  try {
    thread = idle.pop() ?? (await startThread());
    job.resolve(await answerOf(thread, job));
    // An idle thread keeps no process alive; one at work does.
    thread.unref();
    idle.push(thread);
  } catch (error) {
    await thread?.terminate();
    job.reject(error);
  }
}

async function startThread(): Promise<Worker> {
  const thread = new Worker(threadFile, { execArgv: [] });
  await once(thread, 'message');
  return thread;
}

async function answerOf(thread: Worker, { document, limitMs }: Job): Promise<NetReading> {
  thread.ref();
  thread.postMessage(document);
  const limit = new AbortController();
  const timer = setTimeout(() => limit.abort(), limitMs);
  try {
    const [reading] = await once(thread, 'message', { signal: limit.signal });
    return reading;
  } catch (error) {
    throw limit.signal.aborted ? tangled() : error;
  } finally {
    clearTimeout(timer);
  }
}

const tangled = () =>
  unprocessable(
    'net-unfinished',
    'The net cannot be read',
    'The net takes too long to read. A line probably crosses itself many times; find it, redraw it and try again.',
  );
