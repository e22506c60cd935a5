import { describe, expect, it } from 'vitest';
import { findMentions } from '#shared/text/mentions.ts';

const people = [
  { id: 'tove', name: 'Tove Lind' },
  { id: 'tove-b', name: 'Tove Lindberg' },
  { id: 'remi', name: 'Remi Okafor' },
];
const named = (text: string) => findMentions(text, people).flatMap((mention) => mention.personIds);

describe('a person named with @', () => {
  it('is nobody in an address, in a longer word, or where no such name is known', () => {
    expect(named('write to remi@remi okafor.example or info@Tove Lind')).toEqual([]);
    expect(named('@Tove Lindqvist')).toEqual([]);
    expect(named('@Nobody and a bare @')).toEqual([]);
  });

  it('is found with the longest name that fits, whatever its case, before any mark', () => {
    expect(named('@tove lind, and (@Tove Lindberg)?')).toEqual(['tove', 'tove-b']);
    const [mention] = findMentions('Ask @Remi Okafor.', people);
    expect(mention).toEqual({ start: 4, end: 16, personIds: ['remi'] });
  });

  it('is everybody of that name', () => {
    const twins = [...people, { id: 'remi-2', name: 'Remi Okafor' }];
    expect(findMentions('@Remi Okafor', twins)[0]?.personIds).toEqual(['remi', 'remi-2']);
  });
});
