import { fixedText } from '#client/lib/figures.ts';
import { waterText as text } from '#client/text/desk-forms.ts';
import type { EntityOf, UnitSystem } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

/** A flood stands above the full supply level too, but seldom by more than this, in the unit of the document. */
const MOST_ABOVE: Record<UnitSystem, number> = { SI: 5, US: 16 };

/** What is to be asked about a headwater that is taken all the same; null when there is nothing to ask. */
export function headwaterQuestion(
  { headwater, tailwater }: Pick<EntityOf<'waterLevels'>, 'headwater' | 'tailwater'>,
  fullSupplyLevel: number | null,
  { unitSystem, datum }: { unitSystem: UnitSystem; datum: string },
): string | null {
  if (headwater === null) return null;
  if (tailwater !== null && headwater < tailwater) return text.below;
  const most = MOST_ABOVE[unitSystem];
  if (fullSupplyLevel === null || headwater - fullSupplyLevel <= most) return null;
  const level = `${fixedText(fullSupplyLevel, 2)} ${elevationUnit(unitSystem, datum)}`;
  return text.farAboveFullSupply(`${most} ${unitNames(unitSystem).length}`, level);
}
