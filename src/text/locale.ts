import { inLanguage } from './language.ts';

/** Words of the account page about numbers and dates. */
const en = {
  title: 'Numbers and dates',
  lead: 'How figures and dates are shown on this screen. Kept in this browser. Downloads as CSV, calculation sheets and signed records keep the decimal point.',
  field: 'Written as in',
  asBrowser: (name: string) => `The browser’s own: ${name}`,
  example: 'Example',
  typing:
    'Both the point and the comma may be typed for the decimals. Thousands are not parted; where a figure could be read both ways it is asked for again.',
} as const;
export const localeText = inLanguage({ en });
