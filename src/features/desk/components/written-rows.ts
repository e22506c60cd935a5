/**
 * Writes rows of words into an element, and of those only what differs. For what follows the pointer: React takes longer
 * to compare and commit a few words than a frame can spare.
 */
export function writeRows(element: Element, row: RowOf, words: readonly string[]): void {
  while (element.childElementCount > words.length) element.lastElementChild?.remove();
  while (element.childElementCount < words.length) {
    const child = element.ownerDocument.createElement(row.tag);
    child.className = row.className;
    child.append('');
    element.append(child);
  }
  words.forEach((text, i) => {
    const node = element.children[i]?.firstChild;
    if (node instanceof Text && node.data !== text) node.data = text;
  });
}

export type RowOf = { readonly tag: 'p' | 'span'; readonly className: string };
