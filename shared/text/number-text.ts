/** The minus sign proper; a hyphen is too short beside figures. */
export const MINUS = '−';
/** Stands where there is no figure. */
export const NO_FIGURE = '–';

/**
 * What parts the decimals of a figure. Records, files and printed sheets have the point; a screen has the mark its
 * reader is used to.
 */
export type DecimalMark = '.' | ',';

/** A figure written with a point, with another decimal mark. */
export function withMark(figure: string, mark: DecimalMark): string {
  return mark === '.' ? figure : figure.replace('.', mark);
}

/**
 * A number with fixed decimals and a proper minus sign; digits are not grouped. A value that rounds to zero has no
 * sign. Returns the dash when there is no finite value.
 */
export function fixedText(value: number | null, decimals: number, mark: DecimalMark = '.'): string {
  if (value === null || !Number.isFinite(value)) return NO_FIGURE;
  const pointed =
    Math.abs(value) < 1e21 ? Math.abs(value).toFixed(decimals) : Math.abs(value).toExponential(decimals);
  const text = withMark(pointed, mark);
  return value < 0 && /[1-9]/.test(text) ? `${MINUS}${text}` : text;
}

/** As `fixedText`, with a plus sign before positive values: for differences and residuals. */
export function signedText(value: number | null, decimals: number, mark: DecimalMark = '.'): string {
  const text = fixedText(value, decimals, mark);
  return value !== null && value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
}

/** A value and its ± with the same decimals, "114.84 ± 0.14"; only the value when there is no ±. */
export function plusMinusText(
  value: number | null,
  plusMinus: number | null,
  decimals: number,
  mark: DecimalMark = '.',
): string {
  const text = fixedText(value, decimals, mark);
  if (text === NO_FIGURE || plusMinus === null || !Number.isFinite(plusMinus)) return text;
  return `${text} ± ${fixedText(Math.abs(plusMinus), decimals, mark)}`;
}

/** A number as mantissa and power of ten, to be set as "1.2 × 10" with the exponent raised by markup. */
export type PowerParts = { readonly mantissa: string; readonly exponent: number };

/**
 * Splits a number into a mantissa of so many significant figures and a power of ten. Zero has exponent 0; null when
 * there is no finite value. The mantissa carries the proper minus sign, the exponent is a plain number.
 */
export function powerParts(
  value: number | null,
  figures: number,
  mark: DecimalMark = '.',
): PowerParts | null {
  if (value === null || !Number.isFinite(value)) return null;
  const kept = Math.min(21, Math.max(1, Math.round(figures)));
  const [mantissa = '0', exponent = '0'] = value.toExponential(kept - 1).split('e');
  return {
    mantissa: withMark(mantissa.replace('-', MINUS), mark),
    exponent: value === 0 ? 0 : Number(exponent),
  };
}

/** Exponent of a power of ten as text to be raised by markup, with the proper minus sign. */
export function exponentText(exponent: number): string {
  return exponent < 0 ? `${MINUS}${-exponent}` : String(exponent);
}

/** A number to some significant figures without exponent where it is of ordinary size: counts such as 4.25 or 10. */
export function plainText(value: number | null, figures = 4, mark: DecimalMark = '.'): string {
  if (value === null || !Number.isFinite(value)) return NO_FIGURE;
  const rounded = Number(value.toPrecision(figures));
  return withMark(String(rounded).replace('-', MINUS), mark);
}
