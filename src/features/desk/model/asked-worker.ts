/** The part of a Worker that is used, so that its owners can be tested without a browser. */
export type AskedWorker<Question, Answer> = {
  postMessage(question: Question): void;
  onmessage: ((event: MessageEvent<Answer>) => void) | null;
  onerror: ((event: ErrorEvent) => void) | null;
  terminate(): void;
};

/** What is worked out away from the page, one question at a time. */
export type Asked<Question> = {
  /** Asks; a question still under way is given up. */
  ask(question: Question): void;
  /** Wants no answer any more; what works stays ready unless it is at work. */
  drop(): void;
  /** Gives the question under way up, and frees what worked on it. */
  cancel(): void;
};

/**
 * Works questions out in a worker that is started with the first of them, so that its code is loaded only then. A new
 * question ends the worker of one still under way: what takes seconds is never waited for once it is not wanted.
 * `onFailure` is told when the worker itself fails. `isLast` says which answers end a question.
 */
export function createAsked<Question, Answer>(options: {
  start: () => AskedWorker<Question, Answer>;
  onAnswer: (answer: Answer) => void;
  onFailure: () => void;
  isLast?: (answer: Answer) => boolean;
}): Asked<Question> {
  let worker: AskedWorker<Question, Answer> | null = null;
  let busy = false;

  function cancel(): void {
    worker?.terminate();
    worker = null;
    busy = false;
  }

  function started(): AskedWorker<Question, Answer> {
    const fresh = options.start();
    fresh.onmessage = (event) => {
      if (fresh !== worker) return;
      if (options.isLast?.(event.data) ?? true) busy = false;
      options.onAnswer(event.data);
    };
    fresh.onerror = (event) => {
      event.preventDefault();
      if (fresh !== worker) return;
      cancel();
      options.onFailure();
    };
    return fresh;
  }

  return {
    ask(question) {
      if (busy) cancel();
      worker ??= started();
      busy = true;
      worker.postMessage(question);
    },
    drop() {
      if (busy) cancel();
    },
    cancel,
  };
}
