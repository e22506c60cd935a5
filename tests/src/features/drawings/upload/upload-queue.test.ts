import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { SendInput, SendOutcome } from '#client/features/drawings/upload/send-file.ts';
import { createUploadQueue } from '#client/features/drawings/upload/upload-queue.ts';
import { ApiProblem } from '#client/lib/api-problem.ts';
import { noConnection, problemFrom } from '#client/lib/http.ts';
import { MAX_UPLOAD_BYTES } from '#shared/contract/limits.ts';

const DAM = '01a231ba-52e0-737c-88ef-e8df196947ec';
const file = (name: string, size = 10) => new File([new Uint8Array(size)], name);

/** A line to the server that ends each file when the test says so. */
function heldLine() {
  const sent: { input: SendInput; end: (outcome: SendOutcome) => void }[] = [];
  const send = (input: SendInput) =>
    new Promise<SendOutcome>((end) => {
      sent.push({ input, end });
    });
  return { send, sent };
}

function startQueue() {
  const line = heldLine();
  const queue = createUploadQueue(line.send);
  const states = () => queue.store.getState().uploads.map((each) => each.progress.state);
  const settle = () => vi.advanceTimersByTimeAsync(0);
  return { ...line, queue, states, settle };
}

const refused = (code: string, status: number, extra?: Record<string, string>) =>
  problemFrom({ type: 'x', title: 'x', status, detail: 'Why.', code, requestId: 'r', extra }, status, 'r');

beforeEach(() => vi.useFakeTimers());
afterEach(() => vi.useRealTimers());

describe('files on their way', () => {
  it('says what is wrong with an empty or too large file and sends nothing of it', () => {
    const { queue, sent, states } = startQueue();
    const huge = Object.defineProperty(file('huge.tif'), 'size', { value: MAX_UPLOAD_BYTES + 1 });
    queue.add(DAM, [file('empty.tif', 0), huge]);
    expect(states()).toEqual(['failed', 'failed']);
    expect(sent).toHaveLength(0);
  });

  it('go two at a time, the next when one has ended', async () => {
    const { queue, sent, states, settle } = startQueue();
    queue.add(DAM, [file('1.tif'), file('2.tif'), file('3.tif')]);
    expect(states()).toEqual(['sending', 'sending', 'waiting']);
    sent[0]?.end({ outcome: 'added' });
    await settle();
    expect(states()).toEqual(['added', 'sending', 'sending']);
  });

  it('tell how far they are', () => {
    const { queue, sent } = startQueue();
    queue.add(DAM, [file('1.tif')]);
    sent[0]?.input.onProgress(0.25);
    expect(queue.store.getState().uploads[0]?.progress).toEqual({ state: 'sending', share: 0.25 });
  });

  it('are told of when they have arrived, and their line goes by itself', async () => {
    const { queue, sent, settle } = startQueue();
    const arrived: string[] = [];
    queue.onAdded((damId) => arrived.push(damId));
    queue.add(DAM, [file('1.tif')]);
    sent[0]?.end({ outcome: 'added' });
    await settle();
    expect(arrived).toEqual([DAM]);
    await vi.advanceTimersByTimeAsync(6000);
    expect(queue.store.getState().uploads).toEqual([]);
  });

  it('cancelled are broken off, forgotten, and make room for the next', async () => {
    const { queue, sent, states, settle } = startQueue();
    queue.add(DAM, [file('1.tif'), file('2.tif'), file('3.tif')]);
    queue.remove(queue.store.getState().uploads[0]?.id ?? 0);
    expect(sent[0]?.input.signal.aborted).toBe(true);
    sent[0]?.end({ outcome: 'failed', error: noConnection() });
    await settle();
    expect(states()).toEqual(['sending', 'sending']);
  });

  it('the dam already holds are pointed out, and kept as a second drawing when asked to', async () => {
    const { queue, sent, settle } = startQueue();
    queue.add(DAM, [file('1.tif')]);
    sent[0]?.end({ outcome: 'same', drawingId: 'd', message: 'The same file is kept.' });
    await settle();
    const upload = queue.store.getState().uploads[0];
    expect(upload?.progress).toMatchObject({ state: 'same', drawingId: 'd' });
    queue.keepSecond(upload?.id ?? 0);
    expect(sent[1]?.input.again).toBe(true);
  });

  it('can be tried again after a broken connection, not after the file itself was refused', async () => {
    const { queue, sent, settle } = startQueue();
    queue.add(DAM, [file('1.tif'), file('2.tif')]);
    sent[0]?.end({ outcome: 'failed', error: noConnection() });
    sent[1]?.end({ outcome: 'failed', error: refused('unsupported-file', 415) });
    await settle();
    expect(queue.store.getState().uploads.map((each) => each.progress)).toMatchObject([
      { state: 'failed', canRetry: true },
      { state: 'failed', canRetry: false, message: 'Why.' },
    ]);
    queue.retry(queue.store.getState().uploads[0]?.id ?? 0);
    expect(sent).toHaveLength(3);
  });
});

describe('an answer that is no problem document', () => {
  it('still becomes a sentence with the request number', () => {
    const problem = problemFrom('<html>Bad gateway</html>', 502, 'r-1');
    expect(problem).toBeInstanceOf(ApiProblem);
    expect([problem.code, problem.status, problem.problem.requestId]).toEqual(['internal', 502, 'r-1']);
    expect(problem.message).not.toContain('html');
  });
});
