import { inLanguage } from './language.ts';

/** Words of the schedule of reading points. */
const enScheduleText = {
  title: 'Reading points',
  lead: (datum: string, gammaW: string, unit: string) =>
    `${datum === '' ? 'elevations as typed' : `elevations to ${datum}`}, pressure with γw = ${gammaW} ${unit}`,
  plusMinus: '± at 95 %',
  /** What the first engine froze was made of a quarter of a drop and the calibration. */
  provisional: '± provisional',
  unfinished: 'Net unfinished',
  unfinishedRow: 'no figure, net unfinished',
  workingOut: 'working out…',
  failed: 'The reading could not be worked out. Undo the last change, or reload the page.',
  head: {
    point: 'Point',
    offset: (unit: string) => `Offset, ${unit}`,
    elevation: (unit: string) => `Elevation, ${unit}`,
    drops: 'Drops lost',
    totalHead: (unit: string) => `Total head, ${unit}`,
    pressureHead: (unit: string) => `Pressure head, ${unit}`,
    pressure: (unit: string) => `Pore pressure, ${unit}`,
    count: 'Count',
  },
  sortBy: (column: string) => `Sort by ${column}`,
  copy: 'Copy table',
  copied: 'The table is on the clipboard.',
  notCopied: 'The browser did not let the table be copied. Download it as CSV instead.',
  add: 'Type a point',
  empty: 'No reading points yet. Press R and click on the drawing, or type the coordinates of one.',
  emptyReadOnly: 'No reading points on this net.',
  nameOf: (name: string) => `Name of ${name}`,
  offsetOf: (name: string) => `Offset of ${name}`,
  elevationOf: (name: string) => `Elevation of ${name}`,
  unnamed: 'unnamed point',
  show: 'How counted',
  /** What the button shows comes first in its name, so that it can be said to be pressed. */
  named: (shown: string, name: string) => `${shown}: ${name}`,
  hide: 'Close',
  remove: 'Remove point',
  abovePhreatic: 'above the phreatic line, suction left out',
  reading: 'no figure yet',
  caution:
    'A flow net is a two-dimensional, steady-state estimate. Local codes and licensed practice decide what may be built on it.',
  labels: {
    renamed: (from: string, to: string) => `named ${from || 'a point'} ${to}`,
    moved: (name: string) => `typed the coordinates of ${name}`,
    removed: (name: string) => `removed ${name}`,
    added: (name: string) => `added ${name} by its coordinates`,
  },
  needsSetOut: 'Set the section out first: a typed place needs the scale.',
} as const;
export const scheduleText = inLanguage({ en: enScheduleText });

/** Words for figures that are typed. */
const enTypedNumberText = {
  notANumber: 'Not a number. Type it as 118.25 or 118,25.',
  ambiguous: (typed: string) =>
    `${typed} may be ${typed.replace(/[.,]/, '')} or a decimal. Leave the thousands unparted, or type a further zero.`,
  needed: 'A figure is needed here.',
  mustBePositive: 'It has to be greater than zero.',
  tooLarge: 'This figure is too large. Check the decimal point and the unit.',
} as const;
export const typedNumberText = inLanguage({ en: enTypedNumberText });
