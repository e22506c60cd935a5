import { inLanguage } from './language.ts';

/** Words of a frozen revision that is computed with the present engine, and of the solution beside it. */
const en = {
  views: { frozen: 'Reading points', independent: 'Independent solution', again: 'Run again' },
  independent: {
    notRecord: (label: string, frozenBy: string, now: string) =>
      `Worked out now by engine ${now}. It is no part of the record of revision ${label}, which holds none; the traced figures beside it are those frozen by engine ${frozenBy}.`,
  },
  lead: (label: string, frozenBy: string, now: string) =>
    frozenBy === now
      ? `Reads the frozen traces and inputs of revision ${label} again with engine ${now}, by which it was frozen.`
      : `Reads the frozen traces and inputs of revision ${label}, frozen by engine ${frozenBy}, again with engine ${now}.`,
  notStored: 'The record stays as it was: nothing of this is kept.',
  run: 'Run again',
  runAnew: 'Run once more',
  cancel: 'Cancel',
  working: 'Reading the frozen net…',
  failed: 'The frozen net could not be read again. The record is not touched by it.',
  allEqual: (count: number) => `All ${count} figures are equal to the last digit shown.`,
  someDiffer: (differ: number, all: number) =>
    `${differ} of ${all} figures ${differ === 1 ? 'differs' : 'differ'} from the frozen record; the others are equal to the last digit shown.`,
  roundedEqual: (count: number) =>
    `${count} of the equal figures ${count === 1 ? 'differs' : 'differ'} in digits that are not shown.`,
  noFigures: 'Neither reading has a figure.',
  onlyDiffering: 'Only what differs',
  caption: 'The frozen figures and those of now',
  head: {
    figure: 'Figure',
    frozen: (engine: string) => `Frozen, engine ${engine}`,
    now: (engine: string) => `Now, engine ${engine}`,
    difference: 'Difference',
  },
  statuses: { read: 'read', abovePhreatic: 'above the phreatic line', withheld: 'withheld' },
  wasRead: (status: string) => `Frozen: ${status}.`,
  isRead: (status: string) => `Now: ${status}.`,
  equal: 'equal',
  equalPlaces: (count: number) =>
    `Not listed: ${count} ${count === 1 ? 'place' : 'places'} of profiles, equal in every figure.`,
  morePlaces: (count: number) =>
    `${count} more ${count === 1 ? 'place' : 'places'} of profiles ${count === 1 ? 'differs' : 'differ'}; the CSV file lists all.`,
  plusMinusDiffers: '± differs',
  newFindings: 'Found now, not in the record',
  goneFindings: 'In the record, not found now',
  download: 'Download CSV',
  fileName: (drawing: string, label: string) => `${drawing}-${label}-run-again.csv`,
} as const;
export const runAgainText = inLanguage({ en });
