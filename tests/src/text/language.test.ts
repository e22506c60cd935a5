import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { type Catalogue, inLanguage, pickLanguage, type SameTexts } from '#client/text/language.ts';

const folder = path.resolve(import.meta.dirname, '../../../src/text');

describe('the language of the interface', () => {
  it('is the first of the browser’s that there is, by its whole tag or by its language', () => {
    expect(pickLanguage(['sv-SE', 'de-CH', 'en'], ['en', 'de', 'de-CH'])).toBe('de-CH');
    expect(pickLanguage(['sv-SE', 'de-AT', 'en'], ['en', 'de'])).toBe('de');
  });

  it('is the first known one where the browser’s are none of them', () => {
    expect(pickLanguage(['sv-SE'], ['en', 'de'])).toBe('en');
    expect(pickLanguage([], ['en', 'de'])).toBe('en');
  });

  it('gives the texts of an area', () => {
    const en = { save: 'Save', saved: (at: string) => `Saved ${at}` } as const;
    const texts = inLanguage({ en });
    expect(texts.saved('10:42')).toBe('Saved 10:42');
  });

  it('has catalogues that do not compile when a text is missing or takes other arguments', () => {
    const en = { save: 'Save', saved: (at: string) => `Saved ${at}` } as const;
    const whole: SameTexts<typeof en> = { save: 'Spara', saved: (at) => `Sparat ${at}` };
    // @ts-expect-error one text is missing
    const short: SameTexts<typeof en> = { save: 'Spara' };
    // @ts-expect-error a text is no figure
    const other: SameTexts<typeof en> = { save: 'Spara', saved: (at: string) => at.length };
    const catalogue: Catalogue<typeof en> = { en };
    expect([whole.save, short.save, other.save, catalogue.en.save]).toEqual([
      'Spara',
      'Spara',
      'Spara',
      'Save',
    ]);
  });
});

describe('the texts of the interface', () => {
  const files = readdirSync(folder).filter((name) => name !== 'language.ts');

  it.each(files)('%s says everything through a catalogue', (name) => {
    const source = readFileSync(path.join(folder, name), 'utf8');
    const outside = [...source.matchAll(/^export const (\w+) = (?!inLanguage\()/gm)].map(([, each]) => each);
    expect(outside).toEqual([]);
  });
});

describe('the figures of the interface', () => {
  const source = path.resolve(folder, '..');
  const files = readdirSync(source, { recursive: true, encoding: 'utf8' }).filter(
    (name) => /\.tsx?$/.test(name) && name !== path.join('lib', 'figures.ts'),
  );

  it('have the decimal mark of the screen: nothing writes them past lib/figures', () => {
    const past = files.filter((name) =>
      /^import (?!type ).*#shared\/text\/number-text\.ts/m.test(
        readFileSync(path.join(source, name), 'utf8'),
      ),
    );
    expect(past).toEqual([]);
  });
});
