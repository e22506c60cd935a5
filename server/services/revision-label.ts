/** The letter of a net's nth revision: A to Z, then AA, AB and so on, as on a drawing's own list of revisions. */
export function revisionLabel(number: number): string {
  const letter = String.fromCharCode(65 + ((number - 1) % 26));
  return number <= 26 ? letter : revisionLabel(Math.floor((number - 1) / 26)) + letter;
}
