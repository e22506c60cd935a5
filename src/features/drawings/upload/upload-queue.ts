import { createStore, type StoreApi } from 'zustand/vanilla';
import { ApiProblem } from '#client/lib/api-problem.ts';
import { byteText, drawingsText as text } from '#client/text/drawings.ts';
import { MAX_UPLOAD_BYTES } from '#shared/contract/limits.ts';
import type { ProblemCode } from '#shared/contract/problem.ts';
import type { SendFile, SendOutcome } from './send-file.ts';

export type UploadState =
  | { state: 'waiting' }
  | { state: 'sending'; share: number }
  | { state: 'added' }
  | { state: 'same'; drawingId: string; message: string }
  | { state: 'failed'; message: string; error: Error | null; canRetry: boolean };

export interface Upload {
  id: number;
  damId: string;
  file: File;
  again: boolean;
  progress: UploadState;
}

export interface UploadQueue {
  store: StoreApi<{ uploads: readonly Upload[] }>;
  add(damId: string, files: readonly File[]): void;
  /** Stops it if it runs and takes its line away. */
  remove(id: number): void;
  retry(id: number): void;
  keepSecond(id: number): void;
  /** Called after each file that was added; returns the way to stop. */
  onAdded(listener: (damId: string) => void): () => void;
}

/** Two at a time: the second file starts while the first is being checked, and none starves a slow line. */
const AT_ONCE = 2;
/** How long the line of a file that has arrived stays. */
const ADDED_SHOWN_MS = 5000;

/** What is wrong with a file before any of it is sent; null when nothing is. */
export function faultBeforeSending(file: Pick<File, 'size'>): string | null {
  if (file.size === 0) return text.emptyFile;
  return file.size > MAX_UPLOAD_BYTES ? text.tooLarge(byteText(file.size)) : null;
}

/** Files on their way to the server, kept outside the pages so that going to another page does not stop them. */
export function createUploadQueue(send: SendFile): UploadQueue {
  const store = createStore<{ uploads: readonly Upload[] }>(() => ({ uploads: [] }));
  const running = new Map<number, AbortController>();
  const listeners = new Set<(damId: string) => void>();
  let nextId = 1;

  const change = (id: number, part: Partial<Upload>) =>
    store.setState(({ uploads }) => ({
      uploads: uploads.map((each) => (each.id === id ? { ...each, ...part } : each)),
    }));

  const remove = (id: number) => {
    running.get(id)?.abort();
    store.setState(({ uploads }) => ({ uploads: uploads.filter((each) => each.id !== id) }));
  };

  const finish = (upload: Upload, result: SendOutcome) => {
    change(upload.id, { progress: progressOf(result) });
    if (result.outcome !== 'added') return;
    for (const listener of listeners) listener(upload.damId);
    // By then the register shows the drawing itself.
    setTimeout(() => remove(upload.id), ADDED_SHOWN_MS);
  };

  const start = async (upload: Upload) => {
    const abort = new AbortController();
    running.set(upload.id, abort);
    change(upload.id, { progress: { state: 'sending', share: 0 } });
    const { damId, file, again } = upload;
    const onProgress = (share: number) => change(upload.id, { progress: { state: 'sending', share } });
    const result = await send({ damId, file, again, onProgress, signal: abort.signal });
    running.delete(upload.id);
    if (!abort.signal.aborted) finish(upload, result);
    startWaiting();
  };

  const startWaiting = () => {
    for (const upload of store.getState().uploads) {
      if (running.size >= AT_ONCE) return;
      if (upload.progress.state === 'waiting') void start(upload);
    }
  };

  const restart = (id: number, part: Partial<Upload>) => {
    change(id, { ...part, progress: { state: 'waiting' } });
    startWaiting();
  };

  return {
    store,
    add(damId, files) {
      const uploads = files.map((file) => newUpload(nextId++, damId, file));
      store.setState((present) => ({ uploads: [...present.uploads, ...uploads] }));
      startWaiting();
    },
    remove,
    retry: (id) => restart(id, {}),
    keepSecond: (id) => restart(id, { again: true }),
    onAdded(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

function newUpload(id: number, damId: string, file: File): Upload {
  const fault = faultBeforeSending(file);
  const progress: UploadState = fault
    ? { state: 'failed', message: fault, error: null, canRetry: false }
    : { state: 'waiting' };
  return { id, damId, file, again: false, progress };
}

function progressOf(result: SendOutcome): UploadState {
  if (result.outcome === 'added') return { state: 'added' };
  if (result.outcome === 'same')
    return { state: 'same', drawingId: result.drawingId, message: result.message };
  return {
    state: 'failed',
    message: result.error.message,
    error: result.error,
    canRetry: isWorthTrying(result.error),
  };
}

/** What the server says of the file itself does not change by sending it once more. */
const LASTING: readonly ProblemCode[] = [
  'unsupported-file',
  'refused-file',
  'too-large',
  'invalid-input',
  'forbidden',
  'not-found',
];

const isWorthTrying = (error: Error) => !(error instanceof ApiProblem && LASTING.includes(error.code));

export const isOnItsWay = (upload: Upload): boolean =>
  upload.progress.state === 'waiting' || upload.progress.state === 'sending';
