import { exponentText, plainText, powerParts } from '#client/lib/figures.ts';
import type { Run } from './runs.tsx';

/** "2 × 10⁻⁷" with the power to be raised; the plain figure where a power of ten would only be in the way. */
export function powerRuns(value: number, figures: number): Run[] {
  const parts = powerParts(value, figures);
  if (parts === null) return [plainText(value, figures)];
  if (parts.exponent >= -2 && parts.exponent <= 2) return [plainText(value, figures)];
  return [`${parts.mantissa} × 10`, { sup: exponentText(parts.exponent) }];
}

/** Significant figures a value was entered with, between 1 and 4. */
export function figuresEntered(value: number): number {
  const digits = String(value)
    .replace(/e.*$/i, '')
    .replace(/[^0-9]/g, '')
    .replace(/^0+/, '');
  return Math.min(4, Math.max(1, digits.replace(/0+$/, '').length));
}
