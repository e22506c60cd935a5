import { enteredText, fixedText } from '#client/lib/figures.ts';
import { damsText as text } from '#client/text/dams.ts';
import type { DamDto } from '#shared/contract/dams.ts';

const LEVEL_DECIMALS = 2;

/** "118.00 m LD": a level with unit and datum, or that it was not entered. */
export function levelText(level: number | null, dam: Pick<DamDto, 'unitSystem' | 'datum'>): string {
  if (level === null) return text.levelUnset;
  const unit = dam.unitSystem === 'SI' ? 'm' : 'ft';
  return `${fixedText(level, LEVEL_DECIMALS)} ${unit} ${dam.datum}`.trim();
}

export const gammaUnit = (dam: Pick<DamDto, 'unitSystem'>) => (dam.unitSystem === 'SI' ? 'kN/m³' : 'lb/ft³');

/** The line below a dam's name: what every figure on it rests on, and the reader's part. */
export function DamFacts({ dam }: { dam: DamDto }) {
  return (
    <>
      {text.fullSupply} {levelText(dam.fullSupplyLevel, dam)}.{' '}
      {dam.unitSystem === 'SI' ? text.siUnits : text.usUnits}, γ<sub>w</sub> = {enteredText(dam.gammaW)}{' '}
      {gammaUnit(dam)}. {text.youAre(dam.roles)}
    </>
  );
}
