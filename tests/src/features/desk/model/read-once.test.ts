import { expect, it } from 'vitest';
import { readOnce } from '#client/features/desk/model/read-once.ts';
import { createReadingClient, type WorkerLike } from '#client/features/desk/model/reading-client.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { documentWith } from '#tests/support/desk/desk-fixture.ts';

/** A worker that holds its answer back until it is told to give it or to fail. */
function heldReader() {
  let ended = false;
  let answer = () => {};
  const worker: WorkerLike = {
    onmessage: null,
    onerror: null,
    terminate: () => {
      ended = true;
    },
    postMessage(question) {
      if ('place' in question) return;
      const { revision, document } = question;
      answer = () =>
        worker.onmessage?.({ data: { revision, reading: readNet(document) } } as Parameters<
          NonNullable<WorkerLike['onmessage']>
        >[0]);
    },
  };
  return {
    reader: createReadingClient(() => worker),
    answer: () => answer(),
    fail: () => worker.onerror?.({ preventDefault: () => undefined } as ErrorEvent),
    ended: () => ended,
  };
}

const document = documentWith({});

it('gives the reading and ends its worker', async () => {
  const held = heldReader();
  const reading = readOnce(document, new AbortController().signal, held.reader);
  held.answer();
  expect(await reading).toEqual(readNet(document));
  expect(held.ended()).toBe(true);
});

it('fails with its worker', async () => {
  const held = heldReader();
  const reading = readOnce(document, new AbortController().signal, held.reader);
  held.fail();
  await expect(reading).rejects.toThrow('could not be read');
  expect(held.ended()).toBe(true);
});

it('ends its worker at once when it is given up', async () => {
  const held = heldReader();
  const giving = new AbortController();
  const reading = readOnce(document, giving.signal, held.reader);
  giving.abort();
  await expect(reading).rejects.toThrow();
  expect(held.ended()).toBe(true);
});
