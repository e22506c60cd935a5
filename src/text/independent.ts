import { fixedText } from '#client/lib/figures.ts';
import { inLanguage } from './language.ts';

/** Words of the independent solution beside the traced net. */
const en = {
  title: 'Independent solution',
  notSetOut: 'Set out the section first.',
  lead: 'Laplace’s equation solved by finite elements between the boundaries drawn, with the levels and permeabilities entered. The traced equipotentials and flow lines are not used.',
  solve: 'Solve the section',
  again: 'Solve again',
  cancel: 'Cancel',
  stages: {
    outline: 'Reading the outline of the section…',
    solving: 'Solving for the heads…',
    comparing: 'Setting the net beside it…',
  },
  failed: 'The section could not be solved.',
  broken: 'The computation ended unexpectedly. Try again, or reload the page.',
  showPlace: 'Show the place',
  outOfDate: 'Out of date: the net has changed since this was solved.',
  show: 'Over the sheet',
  showNet: 'Computed net',
  showNetHint:
    'Thin dashed lines: equipotentials of as many drops as traced, and flow lines of square cells.',
  showDifferences: 'Differences of head',
  differencesHint: (part: readonly string[]) =>
    `Red where the traced net reads higher, blue where it reads lower; darker beyond ${part.join(', ')} of the head lost.`,
  nowhere: (part: string) => `Nowhere more than ${part} of the head lost.`,
  greatest: (above: string, below: string) => `Greatest: ${above} and ${below}.`,
  noDifferences: 'No differences to draw: the traced net gives no heads yet.',
  heads: 'Heads at the reading points',
  sign: 'Difference is traced minus independent. It tells how far the net is from the solution, and is no part of its ±.',
  head: {
    point: 'Point',
    traced: (unit: string) => `Traced, ${unit}`,
    independent: (unit: string) => `Independent, ${unit}`,
    difference: (unit: string) => `Difference, ${unit}`,
    plusMinus: (unit: string) => `± traced, ${unit}`,
    part: 'Of head lost',
  },
  beyond: 'Differences greater than the ± of the traced head are set in bold.',
  outside: 'outside',
  noPoints: 'No reading points to compare.',
  seepage: 'Seepage',
  flowTo: 'Flow',
  flowHead: { traced: 'Traced', independent: 'Independent', difference: 'Difference' },
  all: 'All of it',
  seepageUnit: { SI: 'm³/s per metre', US: 'ft³/s per foot' },
  noPermeability: 'No permeability is entered: heads are right, seepage has no figure.',
  exits: 'Steepest exit gradients',
  exitsLead:
    'At a place, positive outwards of the ground; a tenth of the boundary is left out at its ends and corners, where the mesh would decide.',
  exitPlace: 'Show',
  exitPlaceOf: (boundary: string) => `Show the steepest exit at ${boundary}`,
  exit: { boundary: 'Boundary', gradient: 'Gradient', place: 'Place' },
  singular: 'no bound at its corner',
  net: 'Computed net',
  netCounts: (drops: number, channels: string | null) =>
    channels === null
      ? `${drops} drops. Flow lines have no single value here and are left out.`
      : `${drops} drops, ${channels} channels of square cells.`,
  usesPhreatic:
    'No ground closes the section above: the traced phreatic line was taken as its upper boundary, as it is drawn.',
  quality: (imbalance: string, nodes: string) => `Inflow and outflow differ by ${imbalance}; ${nodes} nodes.`,
  gap: (part: string) => `Bound of the error of the seepage: ${part}.`,
  surface: (length: string) => `On the free surface head and elevation agree within ${length}.`,
  percent: (part: number, decimals: number) => `${fixedText(100 * part, decimals)} %`,
  /** A small part, never shown as nothing. */
  within: (part: number) => (part < 1e-4 ? 'less than 0.01 %' : `${fixedText(100 * part, 2)} %`),
} as const;
export const independentText = inLanguage({ en });
