import type { FontRun, FontStyle, SheetFonts } from './sheet-fonts.ts';

export interface TextLine {
  runs: FontRun[];
  widthPt: number;
}

const lineOf = (runs: FontRun[]): TextLine => ({
  runs,
  widthPt: runs.reduce((sum, run) => sum + run.widthPt, 0),
});

/**
 * Breaks a text into lines of a width, at spaces; a word that is longer than a line, such as a hash, is cut. Line
 * breaks of the text stay.
 */
export function textLines(
  fonts: SheetFonts,
  text: string,
  style: FontStyle,
  sizePt: number,
  widthPt: number,
): TextLine[] {
  const measure = (part: string) => lineOf(fonts.runs(part, style, sizePt));
  return text.split('\n').flatMap((paragraph) => {
    const lines: string[] = [];
    let line = '';
    for (const word of paragraph.split(/[ \t\r\f\v]+/).flatMap((each) => fitting(each, widthPt, measure))) {
      const longer = line === '' ? word : `${line} ${word}`;
      if (measure(longer).widthPt <= widthPt || line === '') line = longer;
      else {
        lines.push(line);
        line = word;
      }
    }
    return [...lines, line].map(measure);
  });
}

function fitting(word: string, widthPt: number, measure: (part: string) => TextLine): string[] {
  if (measure(word).widthPt <= widthPt) return [word];
  const parts: string[] = [];
  let part = '';
  for (const char of word) {
    if (part !== '' && measure(part + char).widthPt > widthPt) {
      parts.push(part);
      part = '';
    }
    part += char;
  }
  return [...parts, part];
}
