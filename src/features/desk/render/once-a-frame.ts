/** Work that is done in the next frame and once in it, however often it falls due. */
export type FrameWork = { due(): void; end(): void };

/** What is shown is made up before it is painted, in the same frame. */
const PHASES = ['scene', 'painting'] as const;
type Phase = (typeof PHASES)[number];

const waiting: Record<Phase, Set<() => void>> = { scene: new Set(), painting: new Set() };
let scheduled = 0;
let running = false;

export function onceAFrame(work: () => void, phase: Phase = 'painting'): FrameWork {
  return {
    due() {
      waiting[phase].add(work);
      schedule();
    },
    end: () => waiting[phase].delete(work),
  };
}

function schedule(): void {
  // What falls due in a frame for a later phase is done in that frame.
  if (running || scheduled !== 0) return;
  scheduled = requestAnimationFrame(runFrame);
}

function runFrame(): void {
  scheduled = 0;
  running = true;
  for (const phase of PHASES) {
    const works = [...waiting[phase]];
    waiting[phase].clear();
    for (const work of works) run(work);
  }
  running = false;
  if (PHASES.some((phase) => waiting[phase].size > 0)) schedule();
}

/** What fails is told as it would be from a frame of its own, and keeps nothing else from being shown. */
function run(work: () => void): void {
  try {
    work();
  } catch (fault) {
    reportError(fault);
  }
}
