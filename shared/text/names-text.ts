/** Names of people in a sentence: "Ada Quist", "Ada Quist and Remi Okafor", "Ada Quist, Remi Okafor and Tove Lind". */
export function namesText(people: ReadonlyArray<{ name: string }>): string {
  const names = people.map(({ name }) => name);
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}
