import type { UnitSystem } from '#shared/contract/document.ts';

const PREFIX = /^(?:ch(?:ainage)?|sta(?:tion)?)\b\.?\s*/i;

/**
 * A chainage as a length along the dam, in the length unit of its unit system: a plain number ("212", "chainage 212.5"),
 * or kilometres and metres with three figures behind the plus ("2+125" is 2125 m), in feet stations of a hundred with two
 * ("12+50" is 1250 ft). Decimals have a point or a comma. Null for anything else, words and grouped digits among it, and
 * for a comma before just three figures, which may group them: a chainage that is guessed would put a section in the
 * wrong place.
 */
export function chainageIn(text: string, system: UnitSystem): number | null {
  const typed = text.trim().replace(PREFIX, '');
  if (/^-?[1-9]\d{0,2},\d{3}$/.test(typed)) return null;
  const bare = typed.replace(',', '.');
  if (/^-?\d+(?:\.\d+)?$/.test(bare)) return Number(bare);
  const behind = system === 'SI' ? 3 : 2;
  const station = new RegExp(String.raw`^(\d+)\+(\d{${behind}}(?:\.\d+)?)$`).exec(bare);
  if (station === null) return null;
  return Number(station[1]) * 10 ** behind + Number(station[2]);
}
