import { fixedText, signedText } from '#client/lib/figures.ts';
import { measuredText as text } from '#client/text/measured.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { DECIMALS } from '#shared/text/unit-text.ts';

export type MeasuredState = 'none' | 'within' | 'adverse' | 'low' | 'wet';

/** How a measured value stands to the net: adverse is more water than the net says, by more than the ± explains. */
export function measuredState({ difference, beyond, wetAboveNet }: MeasuredReading): MeasuredState {
  if (wetAboveNet) return 'wet';
  if (difference === null) return 'none';
  if (!beyond) return 'within';
  return difference > 0 ? 'adverse' : 'low';
}

/** Red for what is adverse, the colour of attention for what is only unexplained. */
export const MEASURED_COLOURS: Record<MeasuredState, string> = {
  none: 'text-ink-2',
  within: '',
  adverse: 'text-wrong font-semibold',
  low: 'text-attention',
  wet: 'text-wrong font-semibold',
};

/** Figures of a measured value as the schedule shows them. */
export function measuredFigures(measured: MeasuredReading, unitSystem: UnitSystem) {
  const { head: decimals } = DECIMALS[unitSystem];
  const plusMinus = (value: number | null) => (value === null ? '' : ` ± ${fixedText(value, decimals)}`);
  return {
    head: fixedText(measured.head, decimals),
    headPlusMinus: plusMinus(measured.headPlusMinus),
    difference: signedText(measured.difference, decimals),
    differencePlusMinus: plusMinus(measured.differencePlusMinus),
  };
}

/** The comparison in whole sentences. */
export function measuredSentence(measured: MeasuredReading, unitSystem: UnitSystem, unit: string): string {
  const state = measuredState(measured);
  if (state === 'wet') return text.wet;
  if (state === 'none') return text.noNet;
  const { difference, differencePlusMinus } = measuredFigures(measured, unitSystem);
  const verdict = { within: text.within, adverse: text.beyondAdverse, low: text.beyondLow }[state];
  return `${text.result(difference, differencePlusMinus, unit)} ${measured.differencePlusMinus === null ? '' : verdict}`.trim();
}
