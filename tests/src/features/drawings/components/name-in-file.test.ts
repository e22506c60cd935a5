import { expect, it } from 'vitest';
import { nameInFile } from '#client/features/drawings/components/name-in-file.ts';

it.each(['', '{', 'null', '[]', '7', '{"name": 7}', '{"title": "x"}'])('no name is in %j', (content) => {
  expect(nameInFile(content)).toBe('');
});

it('the name of the file is proposed, also behind a byte order mark', () => {
  expect(nameInFile('\uFEFF{"name": " Flood 119.40 "}')).toBe('Flood 119.40');
});
