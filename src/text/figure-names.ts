import type { FigureGroup, FigureName, GroupKind } from '#shared/compute/compare-figures/figure-types.ts';
import { inLanguage } from './language.ts';

/** Names of all figures of a reading, where readings stand beside one another. */
const en = {
  figures: {
    headwater: 'Headwater',
    tailwater: 'Tailwater',
    gammaW: 'Unit weight of water',
    k: 'Permeability k',
    kv: 'Permeability across the bedding kv',
    drops: 'Drops Nd',
    channels: 'Channels Nf',
    shapeFactor: 'Nf/Nd',
    headLost: 'Head lost',
    headPerDrop: 'Head per drop',
    seepage: 'Seepage',
    seepageFactor: 'Factor of the seepage, ×/÷',
    scale: 'Scale of the set-out',
    residual: 'Residual of the set-out',
    poorCells: 'Cells out of shape',
    poorAngles: 'Crossings off square',
    poorChannels: 'Channels of another flow',
    creepRatio: 'Weighted creep ratio',
    outletHead: 'Head at the outlet',
    offset: 'Offset',
    elevation: 'Elevation',
    dropsLost: 'Drops lost',
    totalHead: 'Total head',
    pressureHead: 'Pressure head',
    porePressure: 'Pore pressure',
    measuredDifference: 'Measured less net',
    greatestPressure: 'Greatest pore pressure',
    uplift: 'Water pressure, resultant',
    upliftUp: 'Water pressure, upwards',
    upliftSideways: 'Water pressure, towards growing offsets',
    upliftArm: 'Water pressure, from its first end',
    excess: 'Excess over tailwater, resultant',
    excessUp: 'Excess over tailwater, upwards',
    ru: 'Ratio of pore pressure to overburden',
    cellGradient: 'Gradient, cell average',
    pointGradient: 'Gradient at the place',
    exitFactor: 'Factor, cell average',
    pointFactor: 'Factor at the place',
    seepageForce: 'Seepage force',
    excessHead: 'Mean excess head',
    heaveFactor: 'Factor against heave',
  } satisfies Record<FigureName, string>,
  groups: {
    levels: 'Levels and permeability',
    net: 'The net',
    outlet: 'Outlet',
    point: 'Point',
    profile: 'Profile',
    sample: 'Place of profile',
    exit: 'Exit',
    heave: 'Heave beside a wall',
  } satisfies Record<GroupKind, string>,
  unnamed: 'without a name',
  abovePhreatic: 'above the phreatic line',
  perPixel: (unit: string) => `${unit}/px`,
  force: { SI: 'kN per m', US: 'lb per ft' },
  permeability: { SI: 'm/s', US: 'ft/s' },
} as const;
export const figureWords = inLanguage({ en });

/** What a group of figures belongs to: "Point P4", "The net". */
export function groupTitle({ kind, name }: Pick<FigureGroup, 'kind' | 'name'>): string {
  const title = figureWords.groups[kind];
  if (kind === 'levels' || kind === 'net') return title;
  return `${title} ${name.trim() || figureWords.unnamed}`;
}
