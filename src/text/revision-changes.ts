import { inLanguage } from './language.ts';

/** Words of what changed from one revision to the next. */
const en = {
  title: (label: string) => `Since revision ${label}`,
  drawOver: (label: string) => `Draw the changed lines of revision ${label} over the sheet`,
  unnamed: 'unnamed',
  change: { added: 'added', removed: 'removed', changed: 'changed' },
  atDrops: (drops: string) => `at ${drops} ${drops === '1' ? 'drop' : 'drops'}`,
  moved: (distance: string, unit: string) => `moved by up to ${distance} ${unit}`,
  movedPx: (distance: string) => `moved by up to ${distance} px`,
  lines: {
    equipotential: 'Equipotential',
    flowLine: 'Flow line',
    phreaticLine: 'Phreatic line',
    impervious: 'Impervious boundary',
    soilBoundary: 'Soil boundary',
    ground: 'Ground',
    submergedFace: 'Submerged face',
    outflowFace: 'Outflow face',
    drain: 'Drain',
  },
  pressures: (unit: string) => `Pore pressure, ${unit}`,
  point: 'Point',
  now: 'Now',
  difference: 'Difference',
} as const;
export const changesWords = inLanguage({ en });
