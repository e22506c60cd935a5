import { inLanguage } from './language.ts';

/** Words of the steps that can be taken back and done again. */
const en = {
  undoSteps: 'Steps to take back',
  redoSteps: 'Steps to do again',
  undoList: 'Choose how far to take back',
  redoList: 'Choose how far to do again',
  /** Of a step in the list, newest first: pressing it takes it and all above it. */
  undoTo: (label: string, count: number) =>
    count === 1 ? `Take back: ${label}` : `Take back ${count} steps, to before: ${label}`,
  redoTo: (label: string, count: number) =>
    count === 1 ? `Do again: ${label}` : `Do again ${count} steps, up to: ${label}`,
  undoCount: (count: number) => (count === 1 ? 'Takes back 1 step' : `Takes back ${count} steps`),
  redoCount: (count: number) => (count === 1 ? 'Does 1 step again' : `Does ${count} steps again`),
  more: (count: number) => `Show ${count} older`,
  unnamed: 'a change',
  kept: 'These steps stay at hand over a reload.',
  notKept: 'This browser does not keep these steps: a reload ends them.',
  dropped: (count: number) =>
    `${count} older ${count === 1 ? 'step does' : 'steps do'} not fit into what this browser keeps over a reload.`,
} as const;
export const historyText = inLanguage({ en });
