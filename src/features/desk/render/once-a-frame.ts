/** Work that is done in a frame and once in it, however often it falls due. */
export type FrameWork = { due(): void; end(): void };

/**
 * What only explains what is under the pointer takes turns, frame by frame, where both are due: no eye reads it faster, and
 * what is dragged then follows the hand with time to spare.
 */
const TURNS = ['magnified', 'told'] as const;
type Turn = (typeof TURNS)[number];

/** What is shown is made up before it is painted, in the same frame. */
const PHASES = ['scene', ...TURNS, 'painting'] as const;
type Phase = (typeof PHASES)[number];

const waiting: Record<Phase, Set<() => void>> = {
  scene: new Set(),
  magnified: new Set(),
  told: new Set(),
  painting: new Set(),
};
let scheduled = 0;
let running = false;
let lastTurn: Turn = 'told';

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
  runPhase('scene');
  runPhase(turnNow());
  runPhase('painting');
  running = false;
  if (PHASES.some((phase) => waiting[phase].size > 0)) schedule();
}

function turnNow(): Turn {
  const next = lastTurn === 'told' ? 'magnified' : 'told';
  if (waiting[next].size > 0) lastTurn = next;
  return lastTurn;
}

function runPhase(phase: Phase): void {
  const works = [...waiting[phase]];
  waiting[phase].clear();
  for (const work of works) run(work);
}

/** What fails is told as it would be from a frame of its own, and keeps nothing else from being shown. */
function run(work: () => void): void {
  try {
    work();
  } catch (fault) {
    reportError(fault);
  }
}
