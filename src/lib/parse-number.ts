import type { DecimalMark } from '#shared/text/number-text.ts';
import { localeStore } from './locale.ts';

/**
 * Reads a number as people type it: decimal point or comma, a proper or a plain minus sign, an exponent, spaces
 * between thousands. Null when it is not a number, and when its mark may as well part thousands (`isAmbiguousNumber`):
 * a level read wrongly by a thousand is worse than one asked for again.
 */
export function parseTypedNumber(
  text: string,
  own: DecimalMark = localeStore.getState().mark,
): number | null {
  if (isAmbiguousNumber(text, own)) return null;
  const pointed = plainOf(text).replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(pointed)) return null;
  const value = Number(pointed);
  return Number.isFinite(value) ? value : null;
}

/**
 * True for "1,234" of a person whose decimal mark is the point, and for "1.234" of one whose mark is the comma: the
 * mark that is not one's own before just three figures is 1.234 to one reader and 1234 to another. One's own mark is
 * always decimal.
 */
export function isAmbiguousNumber(text: string, own: DecimalMark = localeStore.getState().mark): boolean {
  return (own === '.' ? /^[+-]?[1-9]\d{0,2},\d{3}$/ : /^[+-]?[1-9]\d{0,2}\.\d{3}$/).test(plainOf(text));
}

function plainOf(text: string): string {
  return text
    .trim()
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/(\d)[\s\u00a0\u2009\u202f](?=\d{3}(\D|$))/g, '$1');
}
