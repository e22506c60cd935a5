import { describe, expect, it } from 'vitest';
import { parseTypedNumber } from '#client/lib/parse-number.ts';

describe('a typed number', () => {
  it.each(['', '  ', 'abc', '1.2.3', '12 m', '1,234,567', '--5', 'e5', '.'])(
    'is refused when it is %j',
    (text) => {
      expect(parseTypedNumber(text)).toBeNull();
    },
  );

  it('is not guessed at where a comma may be decimal or between thousands', () => {
    expect(parseTypedNumber('1,234')).toBeNull();
    expect(parseTypedNumber('0,125')).toBe(0.125);
    expect(parseTypedNumber('1234,125')).toBe(1234.125);
  });

  it.each([
    ['118', 118],
    ['118.00', 118],
    ['118,25', 118.25],
    [' -24,0 ', -24],
    ['−24.0', -24],
    ['+3', 3],
    ['.5', 0.5],
    ['2e-7', 2e-7],
    ['250 000', 250_000],
    ['1 234,5', 1234.5],
  ])('%j is %d', (text, value) => {
    expect(parseTypedNumber(text)).toBe(value);
  });
});
