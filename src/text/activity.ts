import { inLanguage } from './language.ts';

const en = {
  none: 'Nothing has happened here yet.',
  more: 'Show earlier activity',
  somebody: 'The system',
  when: 'When',
  who: 'Who',
  what: 'What',
  caption: 'Activity, newest first',
} as const;
export const activityText = inLanguage({ en });
