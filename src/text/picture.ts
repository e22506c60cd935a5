import type { LegendEntry } from '#client/features/desk/model/picture-legend.ts';
import { lineText } from './desk-forms.ts';
import { inLanguage } from './language.ts';

type LineEntry = Extract<LegendEntry, { shows: 'line' }>;

/** Words of the picture of the sheet: the dialog that makes it, and what stands on it. */
const en = {
  open: 'Print or save',
  title: 'Print or save the picture',
  part: 'Show',
  parts: { section: 'The whole section', view: 'What is in view now' },
  paper: 'Paper, lying',
  resolution: 'Resolution',
  dpi: (dpi: number) => `${dpi} dots per inch`,
  byWidth: 'Width in pixels',
  widthField: 'Width, px',
  widthWrong: (least: number, most: number) => `Type a whole number from ${least} to ${most}.`,
  scale: 'Scale',
  fits: (n: string | null) => (n === null ? 'As large as fits' : `Largest, about 1:${n}`),
  scaleOf: (n: string) => `1:${n}`,
  noScale: 'The section is not set out, so the picture has no scale.',
  sizeOf: (width: number, height: number, dpi: string) => `${width} × ${height} px, ${dpi} dots per inch`,
  save: 'Save as PNG',
  print: 'Print',
  printHint: 'Print at 100 %, without fitting to the page: the scale is true only then.',
  making: 'Drawing the picture…',
  failed: 'The picture could not be made: a part of the scan did not arrive. Try again.',
  tooTall: 'The title block leaves no room for the drawing. Choose the larger paper.',
  printed: 'Picture of the section',
  cells: {
    drawing: 'Drawing',
    net: 'Load case',
    datum: 'Datum and units',
    scale: 'Scale',
    state: 'State',
    made: 'Picture made',
  },
  datumAndUnits: (datum: string, length: string, pressure: string) =>
    `Elevations in ${length}${datum === '' ? '' : ` ${datum}`}, pressures in ${pressure}`,
  scaleOn: (level: string, paper: string) => `1:${level} on ${paper}`,
  twoScalesOn: (level: string, up: string, paper: string) =>
    `1:${level} along the level, 1:${up} upwards, on ${paper}`,
  seenOtherwise: (name: string) => `Seen as ${name}`,
  notToScale: 'Not to scale',
  states: {
    draft: 'Draft, not checked',
    changed: (label: string) => `Draft, changed since revision ${label}`,
    sent: (label: string) => `Revision ${label}, sent for checking`,
    accepted: (label: string) => `Revision ${label}, accepted`,
    returned: (label: string) => `Revision ${label}, returned`,
  },
  bar: (figure: string, unit: string) => `${figure} ${unit}`,
  barAlong: (figure: string, unit: string) => `${figure} ${unit} along the level`,
  barUp: (figure: string, unit: string) => `${figure} ${unit} upwards`,
  legend: {
    line: ({ kind, way }: LineEntry) => {
      const name = lineText.kinds[kind];
      return way === 'traced'
        ? name
        : `${name}, ${{ guessed: 'guessed', adopted: 'adopted', unfinished: 'unfinished' }[way]}`;
    },
    head: 'Total head',
    readingPoint: 'Reading point',
    knownPoint: 'Known point',
    profile: 'Profile',
    note: 'Note',
  },
  caution:
    'A flow net is a two-dimensional, steady-state estimate. Local codes and licensed practice decide what may be built on it.',
} as const;
export const pictureText = inLanguage({ en });
