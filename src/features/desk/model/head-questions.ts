import type { SheetPoint } from '#shared/contract/document.ts';
import type { HeadRead } from './reading-port.ts';

/** Questions for heads, of which one is with the worker and at most one waits. */
export type HeadQuestions = {
  ask(place: SheetPoint): Promise<HeadRead | null>;
  answer(read: HeadRead): void;
  /** The worker is gone: whoever waits is told that there is no answer. */
  drop(): void;
};

type Waiting = { readonly place: SheetPoint; tell(read: HeadRead | null): void };

/** A pointer asks at every movement: what it has left behind is not worked out. `put`: hands one to the worker. */
export function createHeadQuestions(put: (place: SheetPoint) => void): HeadQuestions {
  let underWay: Waiting | null = null;
  let next: Waiting | null = null;

  function begin(waiting: Waiting): void {
    underWay = waiting;
    put(waiting.place);
  }

  return {
    ask: (place) =>
      new Promise((tell) => {
        const waiting = { place, tell };
        if (underWay === null) begin(waiting);
        else {
          next?.tell(null);
          next = waiting;
        }
      }),
    answer(read) {
      underWay?.tell(read);
      underWay = null;
      const waiting = next;
      next = null;
      if (waiting !== null) begin(waiting);
    },
    drop() {
      underWay?.tell(null);
      next?.tell(null);
      underWay = null;
      next = null;
    },
  };
}
