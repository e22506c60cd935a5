/** "IM" for "Iris Marsh": first letters of the first and the last name. */
export function initialsOf(name: string): string {
  const words = name.trim().split(/\s+/).filter(Boolean);
  const [first, last] = [words[0], words.length > 1 ? words.at(-1) : undefined];
  return [first, last].map((word) => (word ? ([...word][0]?.toLocaleUpperCase() ?? '') : '')).join('');
}

/** "R. Okafor" for "Remi Okafor". */
export function shortName(name: string): string {
  const words = name.trim().split(/\s+/).filter(Boolean);
  const last = words.at(-1);
  if (words.length < 2 || last === undefined) return name.trim();
  return `${[...(words[0] ?? '')][0] ?? ''}. ${last}`;
}
