import { typedNumberText as text } from '#client/text/schedule.ts';
import { isAmbiguousNumber } from './parse-number.ts';

/** Why what was typed could not be taken for a number. */
export function numberFault(typed: string): string {
  return isAmbiguousNumber(typed) ? text.ambiguous(typed.trim()) : text.notANumber;
}
