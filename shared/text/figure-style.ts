import type { Quantity } from '#shared/compute/compare-figures/figure-types.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { fixedText, plainText, powerParts } from './number-text.ts';
import { DECIMALS } from './unit-text.ts';

/** How a figure is written: with fixed decimals, with so many figures, or as a power of ten. */
export type FigureStyle =
  | { readonly form: 'fixed'; readonly decimals: number }
  | { readonly form: 'plain' | 'power'; readonly digits: number };

/** Figures of a permeability or a seepage that two readings can be told apart by. */
const POWER_DIGITS = 3;

/** As schedules and title blocks write it. `digits`: significant figures that it deserves, where that was said. */
export function figureStyle(quantity: Quantity, system: UnitSystem, digits: number | null): FigureStyle {
  const decimals = DECIMALS[system];
  switch (quantity) {
    case 'offset':
      return { form: 'fixed', decimals: decimals.offset };
    case 'elevation':
      return { form: 'fixed', decimals: decimals.elevation };
    case 'totalHead':
    case 'length':
      return { form: 'fixed', decimals: decimals.head };
    case 'drops':
      return { form: 'fixed', decimals: decimals.drops };
    case 'pressure':
      return { form: 'fixed', decimals: decimals.pressure };
    case 'force':
      return { form: 'fixed', decimals: 1 };
    case 'ratio':
      return { form: 'fixed', decimals: 2 };
    case 'permeability':
    case 'seepage':
      return { form: 'power', digits: digits ?? POWER_DIGITS };
    default:
      return { form: 'plain', digits: 4 };
  }
}

/** The figure as it is written, to tell whether two are the same to the last digit shown. */
export function writtenText(value: number | null, style: FigureStyle): string {
  if (style.form === 'fixed') return fixedText(value, style.decimals);
  if (style.form === 'plain') return plainText(value, style.digits);
  const parts = powerParts(value, style.digits);
  return parts === null ? plainText(null) : `${parts.mantissa}e${parts.exponent}`;
}
