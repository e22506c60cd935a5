import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { ChosenNet, SeepageCaution } from '#shared/contract/dam-seepage.ts';
import type { UnitSystem } from '#shared/contract/unit-system.ts';
import { fixedText } from '#shared/text/number-text.ts';
import { sectionTitle } from '#shared/text/section-title.ts';
import { unitNames } from '#shared/text/unit-text.ts';

/** Levels are shown to two decimals: nearer than this they are written alike. */
const LEVEL_DIFFERENCE = 0.005;

/**
 * What has to be known before seepages of several nets are used together, each said once: water levels that differ
 * (then the total belongs to no one state of the water), sections left out, channels that are not all traced, and a
 * permeability without a factor. Levels of `chosen` in metres, told in the dam's length unit. None while fewer than two
 * of them count, for then there is no total.
 */
export function seepageCautions(chosen: readonly ChosenNet[], damSystem: UnitSystem): SeepageCaution[] {
  const counted = chosen.filter(({ leftOut }) => leftOut === null);
  if (counted.length < 2) return [];
  const left = chosen.filter(({ leftOut }) => leftOut !== null);
  const traced = counted.filter(({ tracedOnly }) => tracedOnly);
  const bare = counted.filter(({ factor }) => factor === null);
  return [
    ...levelCautions(counted, damSystem),
    ...about(left, 'leftOut', (names) => `The total is worked out without ${names}.`),
    ...about(
      traced,
      'tracedOnly',
      (names) => `Only the traced channels count in ${names}. The flow beside them is not in the total.`,
    ),
    ...about(
      bare,
      'noFactor',
      (names) =>
        `No factor (×/÷) is entered with the permeability of ${names}. How far the total can be trusted is not known without it.`,
    ),
  ];
}

function levelCautions(counted: readonly ChosenNet[], damSystem: UnitSystem): SeepageCaution[] {
  const range = (of: (net: ChosenNet) => number | null) => rangeOf(counted.map(of), damSystem);
  const headwaters = range(({ headwater }) => headwater);
  const tailwaters = range(({ tailwater }) => tailwater);
  const cautions: SeepageCaution[] = [];
  if (headwaters !== null) {
    const text = `The headwaters of the chosen nets differ: ${headwaters}. The total belongs to no one level of the water. Choose nets of one load case.`;
    cautions.push({ code: 'headwatersDiffer', text });
  }
  if (tailwaters !== null) {
    const text = `The tailwaters of the chosen nets differ: ${tailwaters}. Check that they belong to one load case.`;
    cautions.push({ code: 'tailwatersDiffer', text });
  }
  return cautions;
}

function about(
  nets: readonly ChosenNet[],
  code: SeepageCaution['code'],
  say: (names: string) => string,
): SeepageCaution[] {
  if (nets.length === 0) return [];
  return [{ code, text: say(nets.map(({ sectionName }) => sectionTitle(sectionName)).join(', ')) }];
}

/** "112.50 to 118.00 m" where levels differ, "112.50 m and none" where only some have one; null where all are alike. */
function rangeOf(levels: ReadonlyArray<number | null>, damSystem: UnitSystem): string | null {
  const metres = metresPerLengthUnit(damSystem);
  const held = levels.filter((level) => level !== null).map((level) => level / metres);
  if (held.length === 0) return null;
  const least = Math.min(...held);
  const most = Math.max(...held);
  const differ = most - least > LEVEL_DIFFERENCE;
  const someHaveNone = held.length < levels.length;
  if (!differ && !someHaveNone) return null;
  const range = differ ? `${fixedText(least, 2)} to ${fixedText(most, 2)}` : fixedText(least, 2);
  return `${range} ${unitNames(damSystem).length}${someHaveNone ? ' and none' : ''}`;
}
