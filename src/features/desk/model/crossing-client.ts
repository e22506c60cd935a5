import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { AskedWorker } from './asked-worker.ts';
import type { CrossingAnswer, CrossingQuestion } from './crossing-worker.ts';
import type { InkTiles } from './ink-tiles.ts';

/** Where two drawn lines cross near a place that was asked about; null where none do. */
export type CrossingLook = { readonly about: SheetPx; readonly reach: number; readonly at: SheetPx | null };

/** Looks for crossings of drawn lines on one sheet, in a worker that is started with the first question. */
export type CrossingClient = {
  /** Asks about a place: one question is under way at a time, and only the newest waits. */
  look(about: SheetPx, reach: number): void;
  /** The newest question that was answered; null before the first. */
  newest(): CrossingLook | null;
  onLook(listener: () => void): void;
  close(): void;
};

type CrossingWorker = AskedWorker<CrossingQuestion, CrossingAnswer>;
type Question = { readonly about: SheetPx; readonly reach: number };

const START = () =>
  new Worker(new URL('./crossing-worker.ts', import.meta.url), { type: 'module' }) as CrossingWorker;

export function createCrossingClient(sheet: InkTiles, start: () => CrossingWorker = START): CrossingClient {
  let worker: CrossingWorker | null = null;
  let number = 0;
  let asked: Question | null = null;
  let next: Question | null = null;
  let newest: CrossingLook | null = null;
  let tell = () => {};

  function settle(at: SheetPx | null): void {
    if (asked !== null) newest = { ...asked, at };
    asked = null;
    tell();
    askNext();
  }

  function started(): CrossingWorker {
    const fresh = start();
    fresh.onmessage = ({ data }) => {
      if (data.number === number) settle(data.at === null ? null : sheetPx(...data.at));
    };
    fresh.onerror = (event) => {
      event.preventDefault();
      worker?.terminate();
      worker = null;
      settle(null);
    };
    return fresh;
  }

  function askNext(): void {
    if (asked !== null || next === null) return;
    asked = next;
    next = null;
    worker ??= started();
    number += 1;
    const { id, widthPx, heightPx, tiles } = sheet;
    const { about, reach } = asked;
    worker.postMessage({
      number,
      sheet: { id, widthPx, heightPx, tiles },
      about: [about[0], about[1]],
      reach,
    });
  }

  return {
    look(about, reach) {
      const last = next ?? asked ?? newest;
      if (last !== null && last.about[0] === about[0] && last.about[1] === about[1]) return;
      next = { about, reach };
      askNext();
    },
    newest: () => newest,
    onLook(listener) {
      tell = listener;
    },
    close() {
      next = null;
      asked = null;
      tell = () => {};
      worker?.terminate();
      worker = null;
    },
  };
}
