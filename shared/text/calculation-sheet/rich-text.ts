import { exponentText, NO_FIGURE, powerParts } from '#shared/text/number-text.ts';

/** A run of text, on the line, raised or lowered. */
export interface RichRun {
  text: string;
  level: 'line' | 'raised' | 'lowered';
}

// Private-use characters: nobody types them, so a person's own text is never taken for markup.
const [RAISED, LOWERED, END] = ['\uE000', '\uE001', '\uE002'];
const MARKS = new RegExp(`([${RAISED}${LOWERED}])([^${END}]*)${END}`, 'gu');

export const raised = (text: string) => `${RAISED}${text}${END}`;
export const lowered = (text: string) => `${LOWERED}${text}${END}`;

/** A number as mantissa and raised power of ten with so many significant figures: "2.0 × 10⁻⁶". */
export function powerText(value: number | null, figures: number): string {
  const parts = powerParts(value, figures);
  if (parts === null) return NO_FIGURE;
  return parts.exponent === 0
    ? parts.mantissa
    : `${parts.mantissa} × 10${raised(exponentText(parts.exponent))}`;
}

/** The runs of a text with marks, in order; empty runs are left out. */
export function richRuns(text: string): RichRun[] {
  const runs: RichRun[] = [];
  let from = 0;
  for (const match of text.matchAll(MARKS)) {
    runs.push({ text: text.slice(from, match.index), level: 'line' });
    runs.push({ text: match[2] ?? '', level: match[1] === RAISED ? 'raised' : 'lowered' });
    from = match.index + match[0].length;
  }
  runs.push({ text: text.slice(from), level: 'line' });
  return runs.filter((run) => run.text !== '');
}
