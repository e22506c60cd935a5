import type { SheetPx } from '#shared/compute/frames.ts';
import type { FollowedPath } from '#shared/compute/ink/follow-over-sheet.ts';
import type { AskedWorker } from './asked-worker.ts';
import type { InkTiles } from './ink-tiles.ts';
import type { InkAnswer, InkQuestion } from './ink-worker.ts';

/** From where to where the ink is to be followed, and how near a stroke has to be to be meant, sheet pixels. */
export type InkReach = { readonly from: SheetPx; readonly to: SheetPx; readonly grip: number };
/** The line found for a reach; `path` is null where the scan could not be read. */
export type InkLook = InkReach & { readonly path: FollowedPath | null };

/** Follows the ink of one sheet in a worker, which is started with the first question. */
export type InkClient = {
  /** A first look, for the line under the pointer: only the newest question is answered for certain. */
  look(reach: InkReach): void;
  /** The newest look that was answered; null before the first. */
  newest(): InkLook | null;
  onLook(listener: () => void): void;
  /** The line itself; null where the scan could not be read or the sheet was closed meanwhile. */
  follow(reach: InkReach): Promise<FollowedPath | null>;
  close(): void;
};

type InkWorker = AskedWorker<InkQuestion, InkAnswer>;

const START = () => new Worker(new URL('./ink-worker.ts', import.meta.url), { type: 'module' }) as InkWorker;

/** The client of one sheet. Clicks are asked at once, looks one at a time with the newest next. */
export function createInkClient(sheet: InkTiles, start: () => InkWorker = START): InkClient {
  const waiting = new Map<number, (path: FollowedPath | null) => void>();
  let worker: InkWorker | null = null;
  let lastNumber = 0;
  let looking = false;
  let next: InkReach | null = null;
  let newest: InkLook | null = null;
  let tell = () => {};

  function failAll(): void {
    worker?.terminate();
    worker = null;
    const left = [...waiting.values()];
    waiting.clear();
    for (const answer of left) answer(null);
  }

  function started(): InkWorker {
    const fresh = start();
    fresh.onmessage = ({ data }) => {
      const answer = waiting.get(data.number);
      waiting.delete(data.number);
      answer?.(data.path);
    };
    fresh.onerror = (event) => {
      event.preventDefault();
      if (fresh === worker) failAll();
    };
    return fresh;
  }

  function ask({ from, to, grip }: InkReach, fine: boolean): Promise<FollowedPath | null> {
    worker ??= started();
    lastNumber += 1;
    const number = lastNumber;
    const { id, widthPx, heightPx, tiles } = sheet;
    worker.postMessage({ number, sheet: { id, widthPx, heightPx, tiles }, from, to, grip, fine });
    return new Promise((resolve) => waiting.set(number, resolve));
  }

  async function lookNext(): Promise<void> {
    if (looking) return;
    looking = true;
    for (let reach = next; reach !== null; reach = next) {
      next = null;
      newest = { ...reach, path: await ask(reach, false) };
      tell();
    }
    looking = false;
  }

  return {
    look(reach) {
      next = reach;
      void lookNext();
    },
    newest: () => newest,
    onLook(listener) {
      tell = listener;
    },
    // What is shown before a click is what the click adds, where it was found at full size.
    follow: async (reach) =>
      newest?.path?.fine && isSameReach(newest, reach) ? newest.path : ask(reach, true),
    close() {
      next = null;
      tell = () => {};
      failAll();
    },
  };
}

export function isSameReach(a: InkReach, b: InkReach): boolean {
  const same = (p: SheetPx, q: SheetPx) => p[0] === q[0] && p[1] === q[1];
  return a.grip === b.grip && same(a.from, b.from) && same(a.to, b.to);
}
