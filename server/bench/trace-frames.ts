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

/**
 * Milliseconds that the page's main thread worked for each frame it drew: the sum of its tasks from the beginning of
 * one main-thread frame to the beginning of the next, so that handling the pointer counts with the drawing.
 */
export function mainThreadFrames(events: readonly TraceEvent[]): number[] {
  const threads = new Set(
    events
      .filter((event) => event.name === 'thread_name' && event.args?.name === 'CrRendererMain')
      .map(threadOf),
  );
  // A hidden page draws no frames; the one that is panned drew most.
  const frames = [...threads].map((thread) =>
    framesOfThread(events.filter((event) => threadOf(event) === thread)),
  );
  return frames.sort((a, b) => b.length - a.length)[0] ?? [];
}

const threadOf = (event: TraceEvent) => `${event.pid}/${event.tid}`;

function framesOfThread(events: TraceEvent[]): number[] {
  const begins = events
    .filter((event) => event.ph === 'b' && event.name === 'AnimationFrame')
    .map((event) => event.ts)
    .sort((a, b) => a - b);
  const tasks = events
    .filter((event) => event.ph === 'X' && event.name === 'ThreadControllerImpl::RunTask')
    .sort((a, b) => a.ts - b.ts);
  return begins.slice(0, -1).map((begin, index) => {
    const end = begins[index + 1] ?? begin;
    const within = tasks.filter(
      (task) => task.ts + (task.dur ?? 0) > begin && task.ts + (task.dur ?? 0) <= end,
    );
    return within.reduce((sum, task) => sum + (task.tdur ?? task.dur ?? 0), 0) / 1000;
  });
}
