import { describe, expect, it } from 'vitest';
import { foundParts, searchedWords } from '#shared/text/found-text.ts';

const marked = (text: string, search: string) =>
  foundParts(text, search)
    .map((part) => (part.isHit ? `[${part.text}]` : part.text))
    .join('');

describe('the words of a search', () => {
  it('are what stands between signs, in lower case', () => {
    expect(searchedWords('')).toEqual([]);
    expect(searchedWords(' – ')).toEqual([]);
    expect(searchedWords('HF-118/03, Toe–drain (1961)')).toEqual(['hf', '118', '03', 'toe', 'drain', '1961']);
  });
});

describe('the piece of a note that is shown', () => {
  it('is its beginning where no word of the search is in it', () => {
    expect(marked('', 'drain')).toBe('');
    expect(marked('The blanket is dry.', 'drain')).toBe('The blanket is dry.');
    expect(marked('The blanket is dry.', '')).toBe('The blanket is dry.');
  });

  it('has whole words marked, and beginnings of words for the last one only', () => {
    expect(marked('Drains and a drain', 'drain')).toBe('[Drains] and a [drain]');
    expect(marked('Drains and a drain pipe', 'drain pip')).toBe('Drains and a [drain] [pipe]');
    expect(marked('See HF-118/03.', 'hf 118')).toBe('See [HF]-[118]/03.');
  });

  it('takes regular expressions and markup for text', () => {
    expect(marked('a.c <b>x</b> abc', 'a.c')).toBe('[a].[c] <b>x</b> abc');
  });

  it('lies around the first hit of a long note, cut between words', () => {
    const long = `${'water '.repeat(100)}drain ${'sand '.repeat(100)}`;
    const shown = marked(long, 'drain');
    expect(shown).toMatch(/^… water (water )*\[drain\] (sand )*sand …$/);
    expect(shown.length).toBeLessThan(190);
  });

  it('is cut where it must be when there is no space', () => {
    const shown = marked('x'.repeat(1000), 'x');
    expect(shown.length).toBeLessThan(190);
  });
});
