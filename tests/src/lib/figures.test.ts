import { afterEach, describe, expect, it, vi } from 'vitest';
import { formatFullDay, formatTime } from '#client/lib/dates.ts';
import {
  enteredText,
  fixedText,
  plainText,
  plusMinusText,
  powerParts,
  sentenceText,
  signedText,
} from '#client/lib/figures.ts';
import { chooseLocale, markOf } from '#client/lib/locale.ts';
import { isAmbiguousNumber, parseTypedNumber } from '#client/lib/parse-number.ts';

afterEach(() => chooseLocale(null));

describe('the locale of a screen', () => {
  it('is the browser’s until another one is chosen, and again after that', async () => {
    // As at the opening of a page: files of tests share what is loaded, and a library may have given them a navigator since.
    vi.resetModules();
    const opened = await import('#client/lib/locale.ts');
    const { localeStore } = opened;
    expect(localeStore.getState()).toEqual({ chosen: null, tag: opened.browserLocale(), mark: '.' });
    opened.chooseLocale('de-DE');
    expect(localeStore.getState()).toEqual({ chosen: 'de-DE', tag: 'de-DE', mark: ',' });
    opened.chooseLocale(null);
    expect(localeStore.getState().tag).toBe(opened.browserLocale());
  });

  it.each([
    ['en-GB', '.'],
    ['en-IN', '.'],
    ['de-CH', '.'],
    ['de-DE', ','],
    ['fr-CA', ','],
    ['pt-BR', ','],
    // A mark of its own, in figures of its own: shown in Latin figures with the point.
    ['ar-EG', '.'],
  ])('%s parts decimals by %j', (tag, mark) => {
    expect(markOf(tag)).toBe(mark);
  });
});

describe('figures on the screen', () => {
  it('have the mark of the locale, in every way of writing them', () => {
    chooseLocale('sv-SE');
    expect(fixedText(-118.254, 2)).toBe('−118,25');
    expect(signedText(1.5, 1)).toBe('+1,5');
    expect(plusMinusText(114.84, 0.14, 2)).toBe('114,84 ± 0,14');
    expect(powerParts(1.2e-7, 2)).toEqual({ mantissa: '1,2', exponent: -7 });
    expect(plainText(4.25)).toBe('4,25');
    expect(enteredText(-0.125)).toBe('−0,125');
  });

  it('can be typed back as they are shown, also with three decimals', () => {
    for (const tag of ['en-GB', 'de-DE']) {
      chooseLocale(tag);
      for (const value of [1.234, -12.345, 118.25, 0.001, 250_000])
        expect(parseTypedNumber(enteredText(value))).toBe(value);
    }
  });

  it('have the mark of the locale in sentences of a reading too, and clauses keep their numbers', () => {
    const sentence = 'Head 112.00 m, 3.19 drops down; see 5.2.1. Then 4. Part.';
    expect(sentenceText(sentence)).toBe(sentence);
    chooseLocale('de-DE');
    expect(sentenceText(sentence)).toBe('Head 112,00 m, 3,19 drops down; see 5.2.1. Then 4. Part.');
  });
});

describe('a figure typed by someone whose mark is the comma', () => {
  it('may have a point all the same, unless that may part thousands', () => {
    expect(parseTypedNumber('1,234', ',')).toBe(1.234);
    expect(parseTypedNumber('118.25', ',')).toBe(118.25);
    expect(parseTypedNumber('0.125', ',')).toBe(0.125);
    expect(parseTypedNumber('1.234', ',')).toBeNull();
    expect(isAmbiguousNumber('1.234', ',')).toBe(true);
    expect(parseTypedNumber('1.234,5', ',')).toBeNull();
  });
});

describe('dates', () => {
  it('follow the locale in order, and in the clock', () => {
    const iso = new Date(2026, 10, 28, 15, 42).toISOString();
    chooseLocale('en-US');
    expect(formatFullDay(iso)).toBe('Nov 28, 2026');
    expect(formatTime(iso)).toMatch(/^03:42\sPM$/);
    chooseLocale('de-DE');
    expect(formatFullDay(iso)).toMatch(/^28\. Nov\.? 2026$/);
    expect(formatTime(iso)).toBe('15:42');
  });
});
