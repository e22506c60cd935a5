/** A stretch of a text in which a person is named with @. Positions are those of `String.slice`. */
export interface Mention {
  start: number;
  end: number;
  personIds: string[];
}

/** A letter or digit before @ makes it part of an address, one after the name part of a longer name. */
const WORD = /[\p{L}\p{N}_]/u;

/**
 * Where a text names people as `@Full Name`, in its order. The longest name that fits counts, whatever its case; two
 * people of one name are both meant, since nobody else can tell which.
 */
export function findMentions(text: string, people: ReadonlyArray<{ id: string; name: string }>): Mention[] {
  const byLength = people
    .filter(({ name }) => name.trim() !== '')
    .sort((a, b) => b.name.length - a.name.length);
  const found: Mention[] = [];
  for (let at = text.indexOf('@'); at >= 0; at = text.indexOf('@', at + 1)) {
    if (at > 0 && WORD.test(text.charAt(at - 1))) continue;
    const first = byLength.find(({ name }) => isNamedAt(text, at + 1, name));
    if (!first) continue;
    const same = byLength.filter(({ name }) => name.toLowerCase() === first.name.toLowerCase());
    found.push({ start: at, end: at + 1 + first.name.length, personIds: same.map(({ id }) => id) });
  }
  return found;
}

function isNamedAt(text: string, at: number, name: string): boolean {
  const end = at + name.length;
  if (text.slice(at, end).toLowerCase() !== name.toLowerCase()) return false;
  return end >= text.length || !WORD.test(text.charAt(end));
}
