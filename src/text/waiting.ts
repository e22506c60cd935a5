import { inLanguage } from './language.ts';

/** Words of what waits for a person. */
const en = {
  title: 'Waiting for you',
  nothing: 'Nothing waits for you.',
  due: (day: string) => `due ${day}`,
  wasDue: (day: string) => `was due ${day}`,
  mustAnswer: 'before acceptance',
  showAll: (count: number) => `Show all ${count}`,
} as const;
export const waitingText = inLanguage({ en });
