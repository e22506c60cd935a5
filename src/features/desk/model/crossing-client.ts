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
  /**
   * Asks about a place where something is being set, before any that are only looked at; resolves once that is the
   * newest question answered, or once it has taken too long to be waited for.
   */
  ask(about: SheetPx, reach: number): Promise<void>;
  /** The newest question that was answered; null before the first. */
  newest(): CrossingLook | null;
  onLook(listener: () => void): void;
  close(): void;
};

type CrossingWorker = AskedWorker<CrossingQuestion, CrossingAnswer>;
type Question = { readonly about: SheetPx; readonly reach: number; readonly answered?: () => void };

/** A hand that has clicked waits no longer than this; on a machine at work an answer takes a tenth of it. */
const PATIENCE_MS = 900;

const START = () =>
  new Worker(new URL('./crossing-worker.ts', import.meta.url), { type: 'module' }) as CrossingWorker;

export function createCrossingClient(sheet: InkTiles, start: () => CrossingWorker = START): CrossingClient {
  let worker: CrossingWorker | null = null;
  let number = 0;
  let asked: Question | null = null;
  let next: Question | null = null;
  const due: Question[] = [];
  let newest: CrossingLook | null = null;
  let tell = () => {};

  function settle(at: SheetPx | null): void {
    const question = asked;
    if (question !== null) newest = { about: question.about, reach: question.reach, at };
    asked = null;
    question?.answered?.();
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
    if (asked !== null) return;
    asked = due.shift() ?? next;
    if (asked === null) return;
    if (asked === next) next = null;
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
    ask(about, reach) {
      return new Promise((resolve) => {
        const tooLong = setTimeout(resolve, PATIENCE_MS);
        due.push({
          about,
          reach,
          answered() {
            clearTimeout(tooLong);
            resolve();
          },
        });
        askNext();
      });
    },
    newest: () => newest,
    onLook(listener) {
      tell = listener;
    },
    close() {
      next = null;
      due.length = 0;
      asked = null;
      tell = () => {};
      worker?.terminate();
      worker = null;
    },
  };
}
