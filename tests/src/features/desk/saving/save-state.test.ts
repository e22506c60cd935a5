import { describe, expect, it } from 'vitest';
import {
  couldLoseWork,
  pauseBeforeRetry,
  type SaveFacts,
  saveStateOf,
} from '#client/features/desk/saving/save-state.ts';

const facts = (changes: Partial<SaveFacts> = {}): SaveFacts => ({
  unsent: 0,
  failure: null,
  kept: true,
  savedAt: null,
  conflicts: [],
  refused: [],
  ...changes,
});

describe('the state of saving', () => {
  it('is saved when nothing waits, whatever failed before', () => {
    expect(saveStateOf(facts({ failure: 'offline', savedAt: 7 }))).toEqual({ kind: 'saved', at: 7 });
  });

  it('says whether the work is kept while it cannot be sent', () => {
    const waiting = facts({ unsent: 2, failure: 'offline', kept: false });
    expect(saveStateOf(waiting)).toEqual({ kind: 'waiting', failure: 'offline', kept: false });
    expect(couldLoseWork(waiting)).toBe(true);
    expect(couldLoseWork({ ...waiting, kept: true })).toBe(false);
  });

  it('asks for the sign-in first, then shows what was refused, then what is in conflict', () => {
    const all = facts({
      unsent: 1,
      failure: 'signedOut',
      refused: [{ label: 'drew a line', reason: 'Too long.', requestId: 'r-1' }],
      conflicts: [{ changedBy: { name: 'Remi Okafor' } }],
    });
    expect(saveStateOf(all).kind).toBe('waiting');
    expect(saveStateOf({ ...all, failure: null }).kind).toBe('refused');
    expect(saveStateOf({ ...all, failure: null, refused: [] })).toEqual({
      kind: 'conflict',
      count: 1,
      changedBy: 'Remi Okafor',
    });
  });

  it('waits longer after each failure, up to half a minute', () => {
    const pauses = [1, 2, 3, 10, 100].map((failures) => pauseBeforeRetry(failures, 0.5));
    expect(pauses).toEqual([1000, 2000, 4000, 30_000, 30_000]);
    expect(pauseBeforeRetry(1, 0)).toBe(750);
    expect(pauseBeforeRetry(1, 1)).toBe(1250);
  });
});
