import type { LineKind, TracedLine } from '#shared/contract/document.ts';
import { inLanguage } from './language.ts';

const LINE_WORDS: Record<LineKind, string> = {
  equipotential: 'equipotential',
  flowLine: 'flow line',
  phreaticLine: 'phreatic line',
  impervious: 'impervious boundary',
  soilBoundary: 'soil boundary',
  ground: 'ground line',
  submergedFace: 'submerged face',
  outflowFace: 'outflow face',
  drain: 'drain',
};

/** How a line is called in a sentence: by its kind, with its name when it has one. */
function lineWord(line: Pick<TracedLine, 'line' | 'name'>): string {
  return line.name === '' ? LINE_WORDS[line.line] : `${LINE_WORDS[line.line]} ${line.name}`;
}

/** Names of the steps the tools take, as the activity list and undo show them. */
const en = {
  lineWord,
  lineKind: (kind: LineKind) => LINE_WORDS[kind],
  began: (line: TracedLine) => `began ${article(lineWord(line))}`,
  addedPoint: (line: TracedLine) => `added a point to ${article(lineWord(line))}`,
  tooManyPoints: (most: number) => `A line has ${most} points at most. Finish this one and begin another.`,
  finished: (line: TracedLine) => `finished ${article(lineWord(line))}`,
  tookPointBack: (line: TracedLine) => `took back a point of ${article(lineWord(line))}`,
  movedVertex: (line: TracedLine) => `moved a point of ${article(lineWord(line))}`,
  insertedVertex: 'put a point into a line',
  removedVertex: (line: TracedLine) => `removed a point of ${article(lineWord(line))}`,
  removedLine: (line: TracedLine) => `removed ${article(lineWord(line))}`,
  placedMark: (name: string) => `placed ${name}`,
  movedMark: (name: string) => `moved ${name}`,
  removedMark: (name: string) => `removed ${name}`,
} as const;
export const deskToolText = inLanguage({ en });

function article(words: string): string {
  return /^[aeiou]/.test(words) ? `an ${words}` : `a ${words}`;
}
