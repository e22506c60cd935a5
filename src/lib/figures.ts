import * as shared from '#shared/text/number-text.ts';
import { localeStore } from './locale.ts';

export { exponentText, MINUS, NO_FIGURE } from '#shared/text/number-text.ts';

/**
 * The figures of `shared/text/number-text.ts` with the decimal mark of the person at the screen. Everything the
 * screens show goes through here; files, printed sheets and frozen texts have the point and do not.
 */
const mark = () => localeStore.getState().mark;

export const fixedText = (value: number | null, decimals: number): string =>
  shared.fixedText(value, decimals, mark());

export const signedText = (value: number | null, decimals: number): string =>
  shared.signedText(value, decimals, mark());

export const plusMinusText = (value: number | null, plusMinus: number | null, decimals: number): string =>
  shared.plusMinusText(value, plusMinus, decimals, mark());

export const powerParts = (value: number | null, figures: number): shared.PowerParts | null =>
  shared.powerParts(value, figures, mark());

export const plainText = (value: number | null, figures?: number): string =>
  shared.plainText(value, figures, mark());

/** A figure in full, as it was entered, to be typed over. */
export const enteredText = (value: number | null): string =>
  value === null ? '' : shared.withMark(String(value).replace('-', shared.MINUS), mark());

/**
 * A sentence that was made with points, as the reading's are, with the decimal mark of the screen. Only a point between
 * two digits is one; numbers of clauses such as "5.2.1" keep theirs.
 */
export function sentenceText(sentence: string): string {
  const now = mark();
  if (now === '.') return sentence;
  return sentence.replace(/(?<![\d.])(\d+)\.(\d+)(?!\.?\d)/g, `$1${now}$2`);
}
