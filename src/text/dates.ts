import { inLanguage } from './language.ts';

/** How long ago something was. */
const en = {
  justNow: 'just now',
  minutes: (minutes: number) => `${minutes} min ago`,
  hours: (hours: number) => `${hours} h ago`,
  yesterday: 'yesterday',
} as const;
export const agoText = inLanguage({ en });
