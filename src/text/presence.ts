import { lineText } from './desk-forms.ts';
import { inLanguage } from './language.ts';

/** Words about the others who have the same net open. */
const en = {
  title: 'Also on this net',
  here: (names: string) => `Also here: ${names}`,
  more: (count: number) => `${count} more`,
  yourself: 'you, in another window',
  /** "R. Okafor is on equipotential 5". */
  onThing: (name: string, thing: string) => `${name} is on ${thing}`,
  withTool: (name: string, tool: string) => `${name} has the tool in hand: ${tool}`,
  looking: (name: string) => `${name} is looking`,
  kinds: lineText.kinds,
  point: (name: string) => `reading point ${name}`,
  knownPoint: (name: string) => `known point ${name}`,
  numbered: (kind: string, number: string) => `${kind} ${number}`,
  show: 'Show on the sheet',
} as const;
export const presenceText = inLanguage({ en });
