import type { PhreaticEnd } from '#shared/contract/reading-phreatic.ts';
import { inLanguage } from './language.ts';

/** Words of the check of the phreatic line. */
const en = {
  title: 'Phreatic line',
  lead: 'An equipotential meets the phreatic line at the elevation of its own head. Departure: head minus elevation.',
  guessed: 'It is still a first guess.',
  noMeetings: 'No equipotential with a head meets it.',
  head: (unit: string) => `Head, ${unit}`,
  elevation: (unit: string) => `Elevation, ${unit}`,
  departure: (unit: string) => `Departure, ${unit}`,
  show: 'Show on the sheet',
  entry: 'Entry',
  exit: 'Exit',
  expected: {
    square: 'square to the face',
    level: 'level into the face',
    alongFace: 'along the face',
    vertical: 'vertical',
  } satisfies Record<PhreaticEnd['expected'], string>,
  end: (name: string, expected: string, degrees: string) => `${name}: ${expected}; drawn ${degrees}° off.`,
  noEnd: (name: string) => `${name}: it does not reach a face.`,
} as const;
export const phreaticText = inLanguage({ en });
