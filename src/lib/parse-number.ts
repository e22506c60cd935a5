/**
 * Reads a number as people type it: decimal point or comma, a proper or a plain minus sign, an exponent, spaces
 * between thousands. Null when it is not a number, and for "1,234": that is 1.234 to one reader and 1234 to
 * another, and a level read wrongly by a thousand is worse than one asked for again.
 */
export function parseTypedNumber(text: string): number | null {
  const plain = text
    .trim()
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/(\d)[\s\u00a0\u2009\u202f](?=\d{3}(\D|$))/g, '$1');
  if (/^[+-]?[1-9]\d{0,2},\d{3}$/.test(plain)) return null;
  const pointed = plain.replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(pointed)) return null;
  const value = Number(pointed);
  return Number.isFinite(value) ? value : null;
}
