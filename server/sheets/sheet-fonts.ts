import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type PDFKit from 'pdfkit';
import { richRuns } from '#shared/text/calculation-sheet/rich-text.ts';

type Doc = typeof PDFKit.prototype;

const file = (name: string) => fileURLToPath(import.meta.resolve(`@fontsource/${name}.woff`));
const sans = (script: string, weight: number) => `public-sans/files/public-sans-${script}-${weight}-normal`;
const MATH = 'noto-sans-math/files/noto-sans-math-latin-400-normal';

/** Fonts by preference: a character is set in the first that has it. */
const FAMILIES = {
  plain: [sans('latin', 400), sans('latin-ext', 400), sans('vietnamese', 400), MATH],
  bold: [sans('latin', 700), sans('latin-ext', 700), sans('vietnamese', 700), MATH],
} as const;
export type FontStyle = keyof typeof FAMILIES;

/** A run of text in one font, raised or lowered by a share of its size. */
export interface FontRun {
  text: string;
  font: string;
  sizePt: number;
  risePt: number;
  widthPt: number;
}

/** Stands for a character that no font has. */
const UNKNOWN = '\u25A1';
const SMALL = 0.68;
const RISE = 0.36;
const DROP = -0.16;

/** The part of pdfkit's own font that tells which characters it has; pdfkit does not publish it. */
interface WithFont {
  _font: { font: { hasGlyphForCodePoint(codePoint: number): boolean } };
}

export interface SheetFonts {
  /** The text as runs of one font each, measured. */
  runs(text: string, style: FontStyle, sizePt: number): FontRun[];
}

/** Embeds the fonts in a document and sets texts in them, character by character in the first font that has it. */
export function createSheetFonts(doc: Doc): SheetFonts {
  const known = new Map<string, boolean>();
  for (const name of new Set([...FAMILIES.plain, ...FAMILIES.bold]))
    doc.registerFont(name, readFileSync(file(name)));

  function has(font: string, char: string): boolean {
    const key = `${font} ${char}`;
    const held = known.get(key);
    if (held !== undefined) return held;
    doc.font(font);
    const found = (doc as unknown as WithFont)._font.font.hasGlyphForCodePoint(char.codePointAt(0) ?? 0);
    known.set(key, found);
    return found;
  }

  function measured(text: string, font: string, sizePt: number, risePt: number): FontRun {
    return { text, font, sizePt, risePt, widthPt: doc.font(font).fontSize(sizePt).widthOfString(text) };
  }

  function runs(text: string, style: FontStyle, sizePt: number): FontRun[] {
    return richRuns(text).flatMap(({ text: part, level }) => {
      const size = level === 'line' ? sizePt : sizePt * SMALL;
      const rise = level === 'line' ? 0 : sizePt * (level === 'raised' ? RISE : DROP);
      return byFont(part, style).map((run) => measured(run.text, run.font, size, rise));
    });
  }

  function byFont(text: string, style: FontStyle): Array<{ text: string; font: string }> {
    const found: Array<{ text: string; font: string }> = [];
    for (const char of text.normalize('NFC')) {
      const font = FAMILIES[style].find((name) => has(name, char));
      const last = found.at(-1);
      const set = { text: font ? char : UNKNOWN, font: font ?? MATH };
      if (last?.font === set.font) last.text += set.text;
      else found.push(set);
    }
    return found;
  }

  return { runs };
}
