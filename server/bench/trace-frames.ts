/** What is used of Chromium's trace events; times in microseconds. */
export interface TraceEvent {
  name: string;
  ph: string;
  pid: number;
  tid: number;
  ts: number;
  dur?: number;
  /** Time the thread was on a processor, without waiting for one. */
  tdur?: number;
  args?: { name?: string };
}

/** What the page's main thread did while something was going on. All in milliseconds. */
export interface MainThread {
  /** Work for each frame it drew: the sum of its tasks from the beginning of one to the beginning of the next. */
  readonly work: number[];
  /** From the beginning of one frame to the beginning of the next. */
  readonly every: number[];
  /** The longest task, the time counted that the thread was on a processor. */
  readonly longestTask: number;
}

/** Of the page that drew most: a hidden one draws no frames. Handling the pointer counts with the drawing. */
export function mainThreadOf(events: readonly TraceEvent[]): MainThread {
  const threads = new Set(
    events
      .filter((event) => event.name === 'thread_name' && event.args?.name === 'CrRendererMain')
      .map(threadOf),
  );
  const each = [...threads].map((thread) => ofThread(events.filter((event) => threadOf(event) === thread)));
  return each.sort((a, b) => b.work.length - a.work.length)[0] ?? { work: [], every: [], longestTask: 0 };
}

/** Milliseconds that the page's main thread worked for each frame it drew. */
export const mainThreadFrames = (events: readonly TraceEvent[]): number[] => mainThreadOf(events).work;

const threadOf = (event: TraceEvent) => `${event.pid}/${event.tid}`;

function ofThread(events: TraceEvent[]): MainThread {
  const begins = events
    .filter((event) => event.ph === 'b' && event.name === 'AnimationFrame')
    .map((event) => event.ts)
    .sort((a, b) => a - b);
  const tasks = events.filter((event) => event.ph === 'X' && event.name === 'ThreadControllerImpl::RunTask');
  const work = begins.slice(0, -1).map((begin, index) => {
    const end = begins[index + 1] ?? begin;
    const within = tasks.filter(
      (task) => task.ts + (task.dur ?? 0) > begin && task.ts + (task.dur ?? 0) <= end,
    );
    return within.reduce((sum, task) => sum + busyMs(task), 0);
  });
  return {
    work,
    every: begins.slice(1).map((begin, index) => (begin - begins[index]!) / 1000),
    longestTask: tasks.reduce((longest, task) => Math.max(longest, busyMs(task)), 0),
  };
}

const busyMs = (task: TraceEvent) => (task.tdur ?? task.dur ?? 0) / 1000;
