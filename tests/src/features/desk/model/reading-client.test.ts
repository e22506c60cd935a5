import { describe, expect, it } from 'vitest';
import { createReadingClient, type WorkerLike } from '#client/features/desk/model/reading-client.ts';
import type { HeadAnswer, PointsAhead, ReadingAnswer } from '#client/features/desk/model/reading-worker.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { documentWith } from '#tests/support/desk/desk-fixture.ts';

/** A worker that reads when the test lets it, with the real reading inside. */
function heldWorker() {
  const questions: number[] = [];
  const places: SheetPoint[] = [];
  let answers: Array<() => void> = [];
  const worker: WorkerLike = {
    onmessage: null,
    onerror: null,
    terminate: () => undefined,
    postMessage(question) {
      if ('place' in question) {
        places.push(question.place);
        return;
      }
      const { revision, document } = question;
      questions.push(revision);
      const data: ReadingAnswer = { revision, reading: readNet(document) };
      answers.push(() => worker.onmessage?.({ data } as MessageEvent<ReadingAnswer>));
    },
  };
  const answerAll = () => {
    const due = answers;
    answers = [];
    for (const answer of due) answer();
  };
  return { worker, questions, places, answerAll };
}

describe('reading in a worker', () => {
  it('puts one question at a time and of the later ones only the newest', () => {
    const { worker, questions, answerAll } = heldWorker();
    const client = createReadingClient(() => worker);
    const answered: number[] = [];
    client.onAnswer((revision, reading) => answered.push(reading === null ? -1 : revision));
    for (const revision of [1, 2, 3, 4]) client.ask(documentWith({}), revision);
    expect(questions).toEqual([1]);
    answerAll();
    answerAll();
    expect(questions).toEqual([1, 4]);
    expect(answered).toEqual([1, 4]);
  });

  it('says that a reading failed and asks a fresh worker the next time', () => {
    const workers: ReturnType<typeof heldWorker>[] = [];
    const client = createReadingClient(() => {
      workers.push(heldWorker());
      return workers.at(-1)!.worker;
    });
    const answered: Array<[number, boolean]> = [];
    client.onAnswer((revision, reading) => answered.push([revision, reading !== null]));
    client.ask(documentWith({}), 1);
    workers[0]!.worker.onerror?.({} as ErrorEvent);
    client.ask(documentWith({}), 2);
    workers[1]!.answerAll();
    expect(answered).toEqual([
      [1, false],
      [2, true],
    ]);
  });

  it('tells the points ahead of the reading and goes on waiting for it', () => {
    const { worker, questions, answerAll } = heldWorker();
    const client = createReadingClient(() => worker);
    const told: string[] = [];
    client.onPoints((revision) => told.push(`points ${revision}`));
    client.onAnswer((revision) => told.push(`whole ${revision}`));
    client.ask(documentWith({}), 1);
    client.ask(documentWith({}), 2);
    const { points, measured } = readNet(documentWith({}));
    const data: PointsAhead = { revision: 1, points: { points, measured } };
    worker.onmessage?.({ data } as MessageEvent<PointsAhead>);
    expect(questions).toEqual([1]);
    answerAll();
    expect(told).toEqual(['points 1', 'whole 1']);
    expect(questions).toEqual([1, 2]);
  });

  it('asks for one head at a time, and of the later places only for the newest', async () => {
    const { worker, places } = heldWorker();
    const client = createReadingClient(() => worker);
    expect(await client.headAt([1, 1])).toBeNull();
    client.ask(documentWith({}), 1);
    const [first, second, third] = [
      [1, 1],
      [2, 2],
      [3, 3],
    ].map(([x, y]) => client.headAt([x!, y!]));
    expect(await second).toBeNull();
    expect(places).toEqual([[1, 1]]);
    const between = { before: 'a', after: 'b' };
    const tell = (of: number, totalHead: number) =>
      worker.onmessage?.({ data: { of, head: { totalHead, between } } } as MessageEvent<HeadAnswer>);
    tell(1, 112);
    expect(await first).toEqual({ of: 1, head: { totalHead: 112, between } });
    expect(places).toEqual([
      [1, 1],
      [3, 3],
    ]);
    worker.onerror?.({} as ErrorEvent);
    expect(await third).toBeNull();
  });
});
