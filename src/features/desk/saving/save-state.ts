/** Why sending stopped. `offline` and `server` are tried again by themselves, the others wait for the person. */
export type SendFailure = 'offline' | 'server' | 'signedOut' | 'otherPerson' | 'forbidden';

/** Why the server will never take something, and the number under which its log has that. */
export interface Refusal {
  reason: string;
  /** Empty when the answer bore none. */
  requestId: string;
}

/** What the desk shows about saving; the words are in `text/saving.ts`. */
export type SaveState =
  | { kind: 'saved'; at: number | null }
  | { kind: 'saving' }
  | { kind: 'waiting'; failure: SendFailure; kept: boolean }
  | ({ kind: 'refused'; label: string } & Refusal)
  | { kind: 'conflict'; count: number; changedBy: string | null };

export interface SaveFacts {
  unsent: number;
  failure: SendFailure | null;
  /** Whether everything unsent is on this browser's disk. */
  kept: boolean;
  savedAt: number | null;
  conflicts: ReadonlyArray<{ changedBy: { name: string } | null }>;
  refused: ReadonlyArray<{ label: string } & Refusal>;
}

/** The one state to show: what needs the person comes before what settles by itself. */
export function saveStateOf(facts: SaveFacts): SaveState {
  const { conflicts, refused, failure, kept } = facts;
  const [firstRefused] = refused;
  if (failure === 'signedOut' || failure === 'otherPerson') return { kind: 'waiting', failure, kept };
  if (firstRefused) {
    const { label, reason, requestId } = firstRefused;
    return { kind: 'refused', label, reason, requestId };
  }
  if (conflicts.length > 0) {
    return { kind: 'conflict', count: conflicts.length, changedBy: conflicts[0]?.changedBy?.name ?? null };
  }
  if (facts.unsent === 0) return { kind: 'saved', at: facts.savedAt };
  return failure ? { kind: 'waiting', failure, kept } : { kind: 'saving' };
}

const FIRST_PAUSE_MS = 1000;
const LONGEST_PAUSE_MS = 30_000;

/** Pause before the next try: 1 s, doubled with each failure up to 30 s, spread so that tabs do not beat in step. */
export function pauseBeforeRetry(failures: number, spread: number): number {
  const pause = Math.min(LONGEST_PAUSE_MS, FIRST_PAUSE_MS * 2 ** Math.max(0, failures - 1));
  return pause * (0.75 + 0.5 * spread);
}

/** Whether leaving the page could lose work: only what is neither on the server nor on this browser's disk. */
export function couldLoseWork(facts: Pick<SaveFacts, 'unsent' | 'kept'>): boolean {
  return facts.unsent > 0 && !facts.kept;
}
