import { inLanguage } from './language.ts';

/** Words of the notes. */
const en = {
  title: 'Notes',
  open: (count: number) => (count === 1 ? '1 open' : `${count} open`),
  noneOpen: 'none open',
  empty: 'No notes yet. Press N and click on the drawing, at a point or at a line.',
  emptyReader: 'No notes on this net.',
  showOnSheet: (number: number) => `Show note ${number} on the sheet`,
  at: { readingPoint: (name: string) => `at ${name}`, line: 'at a line', place: '' },
  gone: 'what it was about has been removed',
  answered: 'answered',
  closed: (name: string) => `closed by ${name}`,
  answer: 'Answer',
  close: 'Close note',
  reopen: 'Open again',
  showClosed: (count: number) => (count === 1 ? 'Show 1 closed note' : `Show ${count} closed notes`),
  hideClosed: 'Hide closed notes',
  writeAt: (target: string) => (target === '' ? 'Write a note here' : `Write a note ${target}`),
  text: 'Note',
  answerText: (number: number) => `Answer to note ${number}`,
  send: 'Write note',
  sendAnswer: 'Write answer',
  needed: 'Type what you want to say.',
} as const;
export const notesText = inLanguage({ en });
