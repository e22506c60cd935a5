import type { PointsRead } from '#shared/compute/reread-points.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { createHeadQuestions } from './head-questions.ts';
import type { ReadingPort } from './reading-port.ts';
import type { ReadingQuestion, WorkerAnswer, WorkerQuestion } from './reading-worker.ts';

/** The part of a Worker that is used, so that the client's order of questions can be tested without a browser. */
export type WorkerLike = {
  postMessage(question: WorkerQuestion): void;
  onmessage: ((event: MessageEvent<WorkerAnswer>) => void) | null;
  onerror: ((event: ErrorEvent) => void) | null;
  terminate(): void;
};

function startWorker(): WorkerLike {
  return new Worker(new URL('./reading-worker.ts', import.meta.url), { type: 'module' }) as WorkerLike;
}

/**
 * Reads nets in a worker, one question at a time: of the questions that come in meanwhile only the newest is kept. A
 * worker that fails is replaced and the failure told, so that an old reading is not taken for a new one.
 */
export function createReadingClient(start: () => WorkerLike = startWorker): ReadingPort {
  const listeners = new Set<(revision: number, reading: NetReading | null) => void>();
  const aheadListeners = new Set<(revision: number, points: PointsRead) => void>();
  let worker: WorkerLike | null = null;
  let underWay: ReadingQuestion | null = null;
  let next: ReadingQuestion | null = null;
  const heads = createHeadQuestions((place) => worker?.postMessage({ place }));

  function answer(revision: number, reading: NetReading | null): void {
    for (const listener of listeners) listener(revision, reading);
    underWay = null;
    if (next !== null) put(next);
  }

  function put(question: ReadingQuestion): void {
    next = null;
    underWay = question;
    if (worker === null) worker = prepared();
    worker.postMessage(question);
  }

  function prepared(): WorkerLike {
    const fresh = start();
    fresh.onmessage = ({ data }) => {
      if ('head' in data) heads.answer(data);
      else if ('reading' in data) answer(data.revision, data.reading);
      else for (const listener of aheadListeners) listener(data.revision, data.points);
    };
    fresh.onerror = () => {
      fresh.terminate();
      worker = null;
      heads.drop();
      answer(underWay?.revision ?? 0, null);
    };
    return fresh;
  }

  return {
    ask(document, revision) {
      const question = { document, revision };
      if (underWay === null) put(question);
      else next = question;
    },
    onAnswer(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    onPoints(listener) {
      aheadListeners.add(listener);
      return () => aheadListeners.delete(listener);
    },
    // Without a worker nothing has been read, and there is no net to ask.
    headAt: (place) => (worker === null ? Promise.resolve(null) : heads.ask(place)),
    close() {
      heads.drop();
      listeners.clear();
      aheadListeners.clear();
      next = null;
      worker?.terminate();
      worker = null;
    },
  };
}
