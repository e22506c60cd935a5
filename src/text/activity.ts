import { inLanguage } from './language.ts';

const en = {
  none: 'Nothing has happened here yet.',
  more: 'Show earlier activity',
  somebody: 'The system',
  when: 'When',
  who: 'Who',
  what: 'What',
  caption: 'Activity, newest first',
  about: 'About',
  everybody: 'everybody',
  everything: 'everything',
  abouts: {
    drawings: 'drawings and their pictures',
    nets: 'sections and nets',
    notes: 'notes',
    checking: 'sending and checking',
    dam: 'the dam and its people',
  },
  from: 'From',
  to: 'To',
  noMatch: 'Nothing of this kind happened in these days.',
} as const;
export const activityText = inLanguage({ en });
