import type { PublishedValue } from '#shared/compute/quantities/published-values.ts';
import { inLanguage } from './language.ts';

/** Words of the exit gradients, heave, creep and seepage. */
const en = {
  title: 'Exits and quantities',
  workingOut: 'working out…',
  show: 'Show',
  showExit: (number: number) => `Show: exit ${number}`,
  remarkOn: (exits: string, remark: string) => `Exit ${exits}: ${remark}`,
  exits: {
    title: 'Exit gradients',
    lead: 'Positive upwards. Average: head lost in the last cell over its length. At the place: by the field.',
    none: 'There is no exit cell yet. The net needs flow lines that reach an outlet.',
    exit: 'Exit',
    offset: (unit: string) => `Offset, ${unit}`,
    elevation: (unit: string) => `Elevation, ${unit}`,
    lost: (unit: string) => `Lost, ${unit}`,
    length: (unit: string) => `Length, ${unit}`,
    average: 'Cell average',
    point: 'At the place',
    singular: 'singular',
    critical: 'Critical',
    factor: 'Factor, average',
    pointFactor: 'Factor, place',
    force: (unit: string) => `Seepage force, ${unit}`,
  },
  heave: {
    title: 'Heave of the prism beside a wall',
    none: 'No wall stands beside an outlet.',
    wall: 'Wall',
    depth: (unit: string) => `Depth D, ${unit}`,
    width: (unit: string) => `Width D/2, ${unit}`,
    excess: (unit: string) => `Mean excess head, ${unit}`,
    factor: 'Factor',
    remark: 'Remark',
  },
  creep: {
    title: 'Weighted creep, a rough cross-check',
    none: 'Only for flow under a structure whose impervious contact leads from the headwater to the outlet.',
    figures: (steep: string, flat: string, weighted: string, unit: string) =>
      `Steep contact ${steep} ${unit}, flat contact ${flat} ${unit}: weighted length ${weighted} ${unit}.`,
    ratio: (ratio: string) => `Weighted creep ratio ${ratio}.`,
    noRatio: 'No ratio without a head lost.',
  },
  seepage: {
    title: 'Seepage',
    unit: 'Shown in',
    unitHint: 'For this browser. Gallons are US gallons.',
    perMetre: 'Per metre of dam',
    perFoot: 'Per foot of dam',
    outlet: 'Outlet',
    drops: 'Drops to it',
    channels: 'Channels',
    whole: 'Whole flow',
    tracedOnly: 'Traced channels only: an outermost flow line is no boundary, and water flows beyond it.',
  },
  published: {
    title: 'What books and manuals give',
    lead: 'For information, each with its source; which of them holds here is not decided by them.',
    about: {
      specificGravity: 'Grain specific gravity',
      heave: 'Least factor against heave',
      piping: 'Least factor against piping',
      exitGradient: 'Least factor on the exit gradient',
      gradientAtToe: 'Gradient at a toe',
      laneRatio: 'Least weighted creep ratio',
    } satisfies Record<PublishedValue['about'], string>,
    fromMemory: 'from memory, not looked up',
  },
} as const;
export const exitsText = inLanguage({ en });
