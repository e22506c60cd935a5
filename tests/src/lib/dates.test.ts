import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { formatAgo, formatDay } from '#client/lib/dates.ts';
import { chooseLocale } from '#client/lib/locale.ts';

// Files of tests share what is loaded, and a library may have given them a navigator of another locale.
beforeAll(() => chooseLocale('en-GB'));
afterAll(() => chooseLocale(null));

const now = new Date(2026, 11, 1, 14, 0, 0);
const before = (ms: number) => new Date(now.getTime() - ms).toISOString();
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

describe('how long ago something was', () => {
  it.each([
    [10_000, 'just now'],
    // A clock of the server a little ahead of the browser's is not the future.
    [-5_000, 'just now'],
    [12 * MINUTE, '12 min ago'],
    [2 * HOUR + MINUTE, '2 h ago'],
    [20 * HOUR, 'yesterday'],
    [3 * 24 * HOUR, '28 Nov'],
  ])('%d ms ago is %j', (ms, words) => {
    expect(formatAgo(before(ms), now)).toBe(words);
  });

  it('names the year when it is another one', () => {
    expect(formatDay(new Date(2025, 10, 28).toISOString(), now)).toBe('28 Nov 2025');
  });
});
