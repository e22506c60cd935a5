import { fixedText, NO_FIGURE, plainText, signedText } from '#client/lib/figures.ts';
import type { FigureBeside, Given } from '#shared/compute/compare-figures/figures-beside.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { type FigureStyle, figureStyle } from '#shared/text/figure-style.ts';
import { powerRuns } from './figure-runs.ts';
import type { Run } from './runs.tsx';

type Written = Pick<FigureBeside, 'quantity' | 'digits'>;

/** A figure of one of two readings with its ±, as the schedule writes it. */
export function givenRuns(given: Given, { quantity, digits }: Written, system: UnitSystem): Run[] {
  if (given.value === null) return [NO_FIGURE];
  const style = figureStyle(quantity, system, digits);
  const plusMinus = given.plusMinus === null ? [] : [' ± ', ...valueRuns(given.plusMinus, style)];
  return [...valueRuns(given.value, style), ...plusMinus];
}

function valueRuns(value: number, style: FigureStyle): Run[] {
  if (style.form === 'power') return powerRuns(value, style.digits);
  return [style.form === 'fixed' ? fixedText(value, style.decimals) : plainText(value, style.digits)];
}

/**
 * The difference of two figures with its sign; of figures that are told by powers of ten the part of the first, or how
 * many times the first the second is, since their difference says nothing to the eye.
 */
export function differenceText(figure: FigureBeside, system: UnitSystem): string {
  const { difference, one, quantity, digits } = figure;
  if (difference === null) return NO_FIGURE;
  const style = figureStyle(quantity, system, digits);
  if (style.form === 'fixed') return signedText(difference, style.decimals);
  if (style.form === 'plain') return `${difference > 0 ? '+' : ''}${plainText(difference, style.digits)}`;
  if (!one.value) return NO_FIGURE;
  const part = difference / one.value;
  return part > 1 ? `× ${plainText(1 + part, style.digits)}` : `${signedText(100 * part, 1)} %`;
}
