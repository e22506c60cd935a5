import { describe, expect, it } from 'vitest';
import { createBell } from '#server/jobs/bell.ts';

const never = new AbortController().signal;
/** Longer than any test may take, so that only the bell can end the wait. */
const LONG_MS = 600_000;

describe('a bell', () => {
  it('wakes everybody who waits', async () => {
    const bell = createBell();
    const waits = Promise.all([bell.heard(LONG_MS, never), bell.heard(LONG_MS, never)]);
    bell.ring();
    await waits;
  });

  it('rung while nobody waited ends the next wait, and only that one', async () => {
    const bell = createBell();
    bell.ring();
    bell.ring();
    await bell.heard(LONG_MS, never);
    let woken = false;
    const second = bell.heard(LONG_MS, never).then(() => {
      woken = true;
    });
    await Promise.resolve();
    expect(woken).toBe(false);
    bell.ring();
    await second;
  });

  it('is not waited for longer than was asked, nor after an end', async () => {
    const bell = createBell();
    await bell.heard(1, never);
    const ending = new AbortController();
    const wait = bell.heard(LONG_MS, ending.signal);
    ending.abort();
    await wait;
    await bell.heard(LONG_MS, ending.signal);
  });
});
