/** A piece of a text, marked where it is one of the words searched for. */
export interface FoundPart {
  text: string;
  isHit: boolean;
}

/** What parts words, the same as the function `words_apart` of the database: HF-118/03 is hf, 118 and 03. */
const BETWEEN_WORDS = '[!-/:-@\\[-`{-~‐-―−…·×\\s]+';
const WORD = /[^!-/:-@[-`{-~‐-―−…·×\s]+/gu;
/** Characters shown before the first hit and in all: two lines of a table's cell. */
const BEFORE = 50;
const SHOWN = 170;

/** The words of a search in lower case; the last one may be the beginning of a word. */
export function searchedWords(search: string): string[] {
  return search
    .toLowerCase()
    .split(new RegExp(BETWEEN_WORDS, 'u'))
    .filter((word) => word !== '');
}

/**
 * The piece of `text` around the first of the words searched for, in parts of which the found words are hits; the
 * beginning of the text where none is in it. Words are cut nowhere.
 */
export function foundParts(text: string, search: string): FoundPart[] {
  const flat = text.replaceAll(/\s+/g, ' ').trim();
  const hits = hitsIn(flat, searchedWords(search));
  const [from, to] = windowAround(flat, hits[0]?.[0] ?? 0);
  const parts: FoundPart[] = [];
  let at = from;
  const add = (end: number, isHit: boolean) => {
    if (end > at) parts.push({ text: flat.slice(at, end), isHit });
    at = Math.max(at, end);
  };
  for (const [start, end] of hits) {
    if (start < from || end > to) continue;
    add(start, false);
    add(end, true);
  }
  add(to, false);
  return withEllipses(parts, from > 0, to < flat.length);
}

function hitsIn(text: string, words: readonly string[]): Array<[start: number, end: number]> {
  const whole = new Set(words);
  const begun = words.at(-1);
  if (begun === undefined) return [];
  return [...text.matchAll(WORD)]
    .filter(([word]) => whole.has(word.toLowerCase()) || word.toLowerCase().startsWith(begun))
    .map(({ 0: word, index }) => [index, index + word.length]);
}

function windowAround(text: string, hit: number): [from: number, to: number] {
  const near = hit - BEFORE;
  const from = near <= 0 ? 0 : text.indexOf(' ', near) + 1;
  if (text.length - from <= SHOWN) return [from, text.length];
  const end = text.lastIndexOf(' ', from + SHOWN);
  // A text without spaces is cut where it must be.
  return [from, end > hit ? end : from + SHOWN];
}

function withEllipses(parts: FoundPart[], before: boolean, after: boolean): FoundPart[] {
  return [
    ...(before ? [{ text: '… ', isHit: false }] : []),
    ...parts,
    ...(after ? [{ text: ' …', isHit: false }] : []),
  ];
}
