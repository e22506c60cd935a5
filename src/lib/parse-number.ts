/**
 * Reads a number as people type it: decimal point or comma, a proper or a plain minus sign, an exponent, spaces
 * between thousands. Null when it is not a number; commas between thousands are not guessed at.
 */
export function parseTypedNumber(text: string): number | null {
  const plain = text
    .trim()
    .replace(/[\u2212\u2013]/g, '-')
    .replace(/(\d)[\s\u00a0\u2009\u202f](?=\d{3}(\D|$))/g, '$1')
    .replace(',', '.');
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)) return null;
  const value = Number(plain);
  return Number.isFinite(value) ? value : null;
}
