import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pastePoints } from '#shared/text/paste-points.ts';

describe('places pasted from a spreadsheet', () => {
  it.each([
    ['tabs', '12.5\t101.25\n14\t100'],
    ['tabs with decimal commas', '12,5\t101,25\r\n14\t100\r\n'],
    ['semicolons with decimal commas', '12,5;101,25\n14;100'],
    ['commas with decimal points', '12.5,101.25\n14.0,100.0'],
    ['commas with blanks', '12.5, 101.25\n14, 100'],
    ['blanks', '  12.5   101.25\n14 100  '],
    ['heads of columns and empty lines', 'Offset\tElevation\n\n12.5\t101.25\n\n14\t100\n'],
    ['empty columns at the end', '12.5\t101.25\t\t\n14\t100\t'],
  ])('are read with %s', (_, text) => {
    expect(pastePoints(text)).toEqual({
      ok: true,
      points: [
        [12.5, 101.25],
        [14, 100],
      ],
    });
  });

  it('may be negative, with a hyphen or a proper minus, and in powers of ten', () => {
    expect(pastePoints('-3.5\t−2\n1e2\t.5')).toEqual({
      ok: true,
      points: [
        [-3.5, -2],
        [100, 0.5],
      ],
    });
  });

  it('name every line that cannot be read, empty lines counted', () => {
    const pasted = pastePoints('1\t2\n\n3\tabc\n4\n5\t6\t7\n\t8');
    expect(pasted).toMatchObject({
      ok: false,
      errors: [
        { line: 3, text: expect.stringContaining('elevation “abc”') },
        { line: 4, text: expect.stringContaining('one column') },
        { line: 5, text: expect.stringContaining('3 columns') },
        { line: 6 },
      ],
    });
  });

  it.each(['12,5', '12,5,101,25', '1.234,5\t10', '1 234,5\t10'])(
    'refuse what may mean two things: %s',
    (text) => {
      expect(pastePoints(text).ok).toBe(false);
    },
  );

  it('are none in an empty text', () => {
    expect(pastePoints(' \n')).toMatchObject({ ok: false, errors: [{ line: 1 }] });
  });

  it('come back as they were written', () => {
    const figure = fc.double({ min: -1e6, max: 1e6, noNaN: true, noDefaultInfinity: true });
    const list = fc.array(fc.tuple(figure, figure), { minLength: 1, maxLength: 20 });
    fc.assert(
      fc.property(list, fc.constantFrom('\t', ';', ' ', ', '), (points, parted) => {
        const text = points.map(([x, z]) => `${x + 0}${parted}${z + 0}`).join('\n');
        expect(pastePoints(text)).toEqual({ ok: true, points: points.map(([x, z]) => [x + 0, z + 0]) });
      }),
    );
  });

  it('never throw', () => {
    fc.assert(fc.property(fc.string(), (text) => typeof pastePoints(text).ok === 'boolean'));
  });
});
